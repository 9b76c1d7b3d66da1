import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { PolicyItem } from '@shared/contracts/policy-in-force-contract';
import { failureOf, valueOf } from '../../core/resource-state';
import { InstantPipe } from '../../ui/format/format-pipes';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { SettingsClient } from '../settings-client';
import { policyNumber } from './policy-number';

const shown = (item: PolicyItem) => ({
  ...item,
  shown: policyNumber(item.value, item),
  shownDefault: policyNumber(item.default, item),
  bounds: `${policyNumber(item.lowest, item)} to ${policyNumber(item.highest, item)}`,
  changed: item.value !== item.default,
});

/** The policy in force: every number, where it comes from and since when it is what it is. */
@Component({
  selector: 'app-policy-page',
  imports: [InstantPipe, MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton, StateChip],
  templateUrl: './policy-page.html',
  styleUrls: ['../settings-page.scss', './policy-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PolicyPage {
  protected readonly read = inject(SettingsClient).policy();
  protected readonly problem = computed(() => failureOf(this.read));
  protected readonly policy = computed(() => valueOf(this.read));
  protected readonly chapters = computed(() => {
    const items = this.policy()?.items ?? [];
    return [...new Set(items.map(({ subject }) => subject))].map((title) => ({
      title,
      rows: items.filter(({ subject }) => subject === title).map(shown),
    }));
  });
}

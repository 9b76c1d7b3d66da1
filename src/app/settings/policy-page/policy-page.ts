import { DatePipe } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { failureOf, valueOf } from '../../core/resource-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { SettingsClient } from '../settings-client';
import { policyNumber } from './policy-number';

/** The numbers that ranges are worked out by; to read, not to change. */
@Component({
  selector: 'app-policy-page',
  imports: [DatePipe, MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton, StateChip],
  templateUrl: './policy-page.html',
  styleUrls: ['../settings-page.scss', './policy-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PolicyPage {
  protected readonly read = inject(SettingsClient).policy();
  protected readonly problem = computed(() => failureOf(this.read));
  protected readonly policy = computed(() => valueOf(this.read));
  protected readonly rows = computed(() =>
    this.policy()?.items.map((item) => ({
      ...item,
      shown: policyNumber(item.value, item),
      shownDefault: policyNumber(item.default, item),
      bounds: `${policyNumber(item.lowest, item)} to ${policyNumber(item.highest, item)}`,
      changed: item.value !== item.default,
    })),
  );
}

import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { changedKeys } from '@shared/clinical/program-policy';
import type { PolicyVersion } from '@shared/contracts/policy-change-contract';
import { failureOf, valueOf } from '../../core/resource-state';
import { InstantPipe } from '../../ui/format/format-pipes';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { policyNumber } from '../policy-page/policy-number';
import { SettingsClient } from '../settings-client';

/** How two versions differ, in the order of reading. */
const differencesOf = (from: PolicyVersion, to: PolicyVersion) =>
  changedKeys(from.values, to.values).map((number) => ({
    key: number.key,
    label: number.label,
    from: policyNumber(from.values[number.key] ?? NaN, number),
    to: policyNumber(to.values[number.key] ?? NaN, number),
  }));

/** Every version of the policy: who, when, why, and how it differs from any other. */
@Component({
  selector: 'app-policy-history-page',
  imports: [InstantPipe, MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton],
  templateUrl: './policy-history-page.html',
  styleUrls: ['../settings-page.scss', './policy-history-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PolicyHistoryPage {
  protected readonly read = inject(SettingsClient).policyVersions();
  protected readonly problem = computed(() => failureOf(this.read));
  /** Newest first, each with what it changed of the one before it. */
  protected readonly versions = computed(() =>
    valueOf(this.read)?.items.map((version, index, all) => {
      const former = all[index + 1];
      return { ...version, differences: former ? differencesOf(former, version) : [] };
    }),
  );
  protected readonly first = signal<number | null>(null);
  protected readonly second = signal<number | null>(null);
  /** Any two versions, the newest and the oldest to begin with. */
  protected readonly compared = computed(() => {
    const all = this.versions() ?? [];
    const find = (version: number | null, other: PolicyVersion | undefined) =>
      all.find((each) => each.version === version) ?? other;
    const [from, to] = [find(this.first(), all.at(-1)), find(this.second(), all[0])];
    return from && to ? { from, to, differences: differencesOf(from, to) } : null;
  });

  protected choose(which: 'first' | 'second', { target }: Event): void {
    this[which].set(Number((target as HTMLSelectElement).value));
  }
}

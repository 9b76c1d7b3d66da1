import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import { RouterLink } from '@angular/router';
import type { Prescription } from '@shared/contracts/prescription-record-contract';
import { failureOf, valueOf } from '../../core/resource-state';
import { Cautions } from '../../ui/cautions/cautions';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { LoadLine } from '../../ui/load-line/load-line';
import { commonScale } from '../../ui/load-line/load-line-facts';
import { leastScale } from '../../ui/load-line/upright-drawing';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatDay, formatTime } from '../../ui/words/dates';
import {
  compareCautions,
  compareLimits,
  compareResults,
  compareWorkloads,
} from '../compare/compare-answers';
import { compareInputs } from '../compare/compare-inputs';
import type { Difference, DifferenceGroup } from '../compare/difference';
import { DifferenceTable } from '../compare/difference-table';
import { standingOf } from '../history-list/history-list';
import { PrescriptionsClient } from '../prescriptions-client';
import { loadLineFacts } from '../worksheet-page/load-line-facts';

const oneGroup = (rows: readonly Difference[]): DifferenceGroup[] => [{ heading: '', rows }];
const changesIn = (groups: readonly DifferenceGroup[]): number =>
  groups.flatMap(({ rows }) => rows).filter(({ change }) => change !== null).length;

/** Two versions of a patient's range, the one written first on the left: what they rest on and what they come to. */
@Component({
  selector: 'app-compare-page',
  imports: [
    Cautions,
    DifferenceTable,
    EmptyState,
    LoadLine,
    MatCheckbox,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './compare-page.html',
  styleUrl: './compare-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ComparePage {
  /** Of the address; whichever was written first stands first. */
  readonly oneId = input.required<string>();
  readonly otherId = input.required<string>();

  readonly #client = inject(PrescriptionsClient);
  readonly #one = this.#client.prescription(this.oneId);
  readonly #other = this.#client.prescription(this.otherId);
  readonly #worksheet = this.#client.worksheet(computed(() => valueOf(this.#one)?.patientId));

  protected readonly changedOnly = signal(true);
  protected readonly failure = computed(
    () => failureOf(this.#one) ?? failureOf(this.#other) ?? failureOf(this.#worksheet),
  );
  protected readonly patient = computed(() => valueOf(this.#worksheet)?.patient);
  readonly #both = computed(() => {
    const [one, other] = [valueOf(this.#one), valueOf(this.#other)];
    if (!one || !other) return null;
    return one.createdAt <= other.createdAt ? ([one, other] as const) : ([other, one] as const);
  });
  /** Two ranges may be compared when they are of one patient, and two. */
  protected readonly unfit = computed(() => {
    const both = this.#both();
    if (!both) return null;
    if (both[0].patientId !== both[1].patientId) return 'These are the ranges of two patients';
    return both[0].id === both[1].id ? 'This is one version, named twice' : null;
  });
  protected readonly versions = computed(() =>
    this.#both()?.map((one) => ({ ...this.#headOf(one), id: one.id, standing: standingOf(one) })),
  );
  protected readonly lines = computed(() => {
    const facts = this.#both()?.map(({ inputs, result }) =>
      loadLineFacts(result, inputs.resting.seated, null),
    );
    return facts?.map((line) => ({ ...line, scale: commonScale(facts, leastScale) }));
  });
  protected readonly differences = computed(() => {
    const both = this.#both();
    if (!both) return null;
    const [before, after] = both;
    const results = [before.result, after.result] as const;
    const inputs = compareInputs(before.inputs, after.inputs);
    return {
      inputs,
      changedInputs: changesIn(inputs),
      allInputs: inputs.flatMap(({ rows }) => rows).length,
      results: oneGroup(compareResults(...results)),
      limits: oneGroup(compareLimits(...results)),
      workloads: oneGroup(compareWorkloads(...results)),
      cautions: compareCautions(...results),
    };
  });

  #headOf({ createdAt, createdBy, policyVersion }: Prescription) {
    const zone = this.patient()?.site.timeZone ?? 'UTC';
    return {
      written: `${formatDay(createdAt, zone)}, ${formatTime(createdAt, zone)}`,
      by: `${createdBy.displayName} · policy ${policyVersion}`,
    };
  }
}

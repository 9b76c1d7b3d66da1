import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Prescription } from '@shared/contracts/prescription-record-contract';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Fact } from '../../ui/fact/fact';
import { Icon } from '../../ui/icon/icon';
import { LoadLine } from '../../ui/load-line/load-line';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Quantity } from '../../ui/quantity/quantity';
import { RangeFlags } from '../../ui/range-flags/range-flags';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { formatDay } from '../../ui/words/dates';
import { LiveChanges } from '../../core/live-changes';
import { PatientChart } from '../patient-chart';
import { PatientsClient } from '../patients-client';
import { failureOf, valueOf } from '../../core/resource-state';

interface Standing {
  readonly words: string;
  readonly tone: Tone;
}

/** A patient's prescriptions: the one in force as its load line, all of them with who signed. */
@Component({
  selector: 'app-ranges-section',
  imports: [
    EmptyState,
    Fact,
    Icon,
    LoadLine,
    MatButton,
    ProblemMessage,
    Quantity,
    RangeFlags,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './ranges-section.html',
  styleUrl: './ranges-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RangesSection {
  readonly #chart = inject(PatientChart);
  readonly #resource = inject(PatientsClient).prescriptions(this.#chart.id);

  protected readonly id = this.#chart.id;
  /** A range belongs to a course. */
  protected readonly runs = computed(
    () =>
      valueOf(this.#chart.patient)?.enrollments.some(
        ({ status }) => status === 'active' || status === 'on-hold',
      ) ?? false,
  );
  protected readonly items = computed(() => valueOf(this.#resource));
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly active = computed(() =>
    this.items()?.find(({ status }) => status === 'active'),
  );
  protected readonly flags = computed(
    () => valueOf(this.#chart.patient)?.clinical?.rangeFlags ?? [],
  );
  /** What was entered since took the lead from the rate: effort leads, the ceiling stays. */
  protected readonly effortLeads = computed(() =>
    this.flags().some(({ effect }) => effect === 'withdrawn' || effect === 'effort-today'),
  );
  /** As it stands now: a withdrawn range asks for no more than usual. */
  protected readonly effortNow = computed(() => {
    const range = valueOf(this.#chart.patient)?.clinical?.range;
    return range ? `${range.perceivedExertion.lower}–${range.perceivedExertion.upper}` : null;
  });
  protected readonly timeZone = computed(
    () => valueOf(this.#chart.patient)?.site.timeZone ?? 'UTC',
  );

  constructor() {
    inject(LiveChanges)
      .of(['range'], (patientId) => patientId === this.id())
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.#resource.reload());
  }

  protected readonly day = (instant: string | null) =>
    instant === null ? null : formatDay(instant, this.timeZone());

  protected target({ result }: Prescription): string | null {
    return result.target && `${Number(result.target.lower)}–${Number(result.target.upper)}`;
  }

  protected effort({ result: { perceivedExertion } }: Prescription): string {
    return `${perceivedExertion.lower}–${perceivedExertion.upper}`;
  }

  protected ceiling({ result }: Prescription) {
    if (result.ceiling === null) return null;
    const reason = result.ceiling.bindingLimits.join(', ').replaceAll('-', ' ');
    return { value: Number(result.ceiling.value), reason };
  }

  protected standing({ status, awaiting }: Prescription): Standing {
    switch (status) {
      case 'active':
        return { words: 'In force', tone: 'in' };
      case 'draft':
        return awaiting === 'physician'
          ? { words: 'Awaits a physician', tone: 'due' }
          : { words: 'Draft', tone: 'plain' };
      case 'completed':
        return { words: 'Superseded', tone: 'plain' };
      case 'revoked':
        return { words: 'Put aside', tone: 'plain' };
      case 'entered-in-error':
        return { words: 'Entered in error', tone: 'plain' };
    }
  }
}

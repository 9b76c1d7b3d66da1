import { ChangeDetectionStrategy, Component, DestroyRef, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { VitalReading, VitalsSession } from '@shared/contracts/vitals-history-contract';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Quantity } from '../../ui/quantity/quantity';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { formatLocalDate, formatTime } from '../../ui/words/dates';
import { PatientChart } from '../patient-chart';
import { PagedList } from '../../core/paged-list';
import { PatientsClient } from '../patients-client';

type Placement = NonNullable<VitalReading['placement']>;

const placements: Readonly<Record<Placement, { words: string; tone: Tone }>> = {
  below: { words: 'Below', tone: 'plain' },
  in: { words: 'In range', tone: 'in' },
  above: { words: 'Above', tone: 'due' },
  'over-ceiling': { words: 'Over the ceiling', tone: 'over' },
};

const phases: Readonly<Record<VitalReading['phase'], string>> = {
  resting: 'Resting',
  exercise: 'Exercise',
  recovery: 'Recovery',
};

/** What was logged on the floor, session by session, each reading with its place; an amended one stays beside its amendment. */
@Component({
  selector: 'app-vitals-section',
  imports: [EmptyState, MatButton, ProblemMessage, Quantity, ShowMore, Skeleton, StateChip],
  templateUrl: './vitals-section.html',
  styleUrl: './vitals-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VitalsSection {
  readonly #client = inject(PatientsClient);
  readonly #chart = inject(PatientChart);
  protected readonly list = new PagedList<VitalsSession>(
    (cursor) => this.#client.vitals(this.#chart.id() ?? '', cursor),
    inject(DestroyRef),
  );
  protected readonly placements = placements;
  protected readonly phases = phases;
  protected readonly date = formatLocalDate;
  protected readonly time = formatTime;

  constructor() {
    this.list.load();
  }

  protected pressure({ systolic, diastolic }: VitalReading): string | null {
    if (systolic === null && diastolic === null) return null;
    return `${systolic ?? '–'}/${diastolic ?? '–'}`;
  }

  protected remarks(reading: VitalReading): string {
    const amended =
      reading.amendmentReason && `Amends an earlier reading: ${reading.amendmentReason}`;
    return [reading.symptoms.join(', ').replaceAll('-', ' '), reading.note, amended]
      .filter(Boolean)
      .join('. ');
  }
}

import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { type RangeFlag, factWords } from '@shared/clinical/range-flags';
import type { PrescribingTask, TaskKind } from '@shared/contracts/prescriptions-waiting-contract';
import { LiveChanges } from '../../core/live-changes';
import { auditTime, merge } from 'rxjs';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { formatDay } from '../../ui/words/dates';
import { actionWords } from '../../ui/words/load-words';
import { TodayClient } from '../today-client';

interface Kind {
  readonly words: string;
  /** As it is counted: one, more. */
  readonly counted: readonly [string, string];
  readonly tone: Tone;
  readonly action: string;
  /** Where one sees to it. */
  readonly opens: 'range' | 'new' | 'progress' | 'vitals';
}

const visitsWaitMs = 10_000;

const kinds: Readonly<Record<TaskKind, Kind>> = {
  withdrawn: {
    words: 'Range withdrawn',
    counted: ['range withdrawn', 'ranges withdrawn'],
    tone: 'over',
    action: 'Write a new one',
    opens: 'new',
  },
  'ran-above': {
    words: 'Ran above',
    counted: ['ran above', 'ran above'],
    tone: 'over',
    action: 'See the course',
    opens: 'progress',
  },
  'without-range': {
    words: 'New intake',
    counted: ['new intake', 'new intakes'],
    tone: 'due',
    action: 'Write a range',
    opens: 'new',
  },
  'record-unsigned': {
    words: 'Record not signed',
    counted: ['record not signed', 'records not signed'],
    tone: 'due',
    action: 'Open',
    opens: 'vitals',
  },
  unsigned: {
    words: 'Draft not signed',
    counted: ['draft not signed', 'drafts not signed'],
    tone: 'due',
    action: 'Open',
    opens: 'range',
  },
  'awaiting-physician': {
    words: 'Co-signature',
    counted: ['co-signature', 'co-signatures'],
    tone: 'due',
    action: 'Open',
    opens: 'range',
  },
  'next-step': {
    words: 'Next step',
    counted: ['next step', 'next steps'],
    tone: 'plain',
    action: 'Decide',
    opens: 'progress',
  },
  'ran-below': {
    words: 'Ran below',
    counted: ['ran below', 'ran below'],
    tone: 'plain',
    action: 'See the course',
    opens: 'progress',
  },
  'review-due': {
    words: 'Review due',
    counted: ['review due', 'reviews due'],
    tone: 'plain',
    action: 'Write a new one',
    opens: 'new',
  },
};

const reasonsOf = (flags: readonly RangeFlag[], wanted: RangeFlag['effect']): string =>
  flags
    .filter(({ effect }) => effect === wanted)
    .map(({ fact, detail }) =>
      detail === null ? factWords[fact] : `${factWords[fact]}: ${detail}`,
    )
    .join('; ');

function detailOf(kind: TaskKind, { since, by, step, flags, patient }: PrescribingTask): string {
  const day = since === null ? '' : formatDay(since, patient.site.timeZone);
  switch (kind) {
    case 'withdrawn':
      return `${reasonsOf(flags, 'withdrawn')}. Effort leads and the ceiling stays until a new range is signed`;
    case 'ran-above':
      return `the last two sessions ran mostly above the range, the last on ${day}`;
    case 'ran-below':
      return `the last two sessions ran mostly below the range, the last on ${day}`;
    case 'without-range':
      return `in a course at ${patient.site.name}, and nothing is written yet`;
    case 'record-unsigned':
      return `the class is over since ${day}; begun by ${by ?? ''}`;
    case 'unsigned':
      return `written by ${by ?? ''}, ${day}; in force for nobody`;
    case 'awaiting-physician':
      return `signed by ${by ?? ''}, ${day}; not in force until a physician signs too`;
    case 'next-step':
      return `${step === null ? '' : actionWords[step]}, proposed ${day}`;
    case 'review-due':
      return `${reasonsOf(flags, 'review-due')}; in force since ${day}`;
  }
}

function linkOf({ opens }: Kind, { prescriptionId, patient }: PrescribingTask): string[] {
  const page = ['/patients', patient.id];
  if (opens === 'range' && prescriptionId) return ['/prescriptions', prescriptionId];
  if (opens === 'progress' || opens === 'vitals') return [...page, opens];
  return [...page, 'prescriptions', 'new'];
}

/** What a physiologist has to see to: one list, the most urgent first, each with its why. */
@Component({
  selector: 'app-tasks-section',
  imports: [EmptyState, MatButton, ProblemMessage, RouterLink, Skeleton, StateChip],
  templateUrl: './tasks-section.html',
  styleUrl: './tasks-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TasksSection {
  readonly #resource = inject(TodayClient).tasks();
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly totals = computed(() =>
    valueOf(this.#resource)
      ?.groups.filter(({ total }) => total > 0)
      .map(({ kind, total }) => ({
        kind,
        words: `${total} ${kinds[kind].counted[total === 1 ? 0 : 1]}`,
      })),
  );
  protected readonly rows = computed(() =>
    valueOf(this.#resource)?.groups.flatMap(({ kind, items }) =>
      items.map((item) => ({
        ...kinds[kind],
        key: `${kind} ${item.prescriptionId ?? item.patient.id} ${item.since ?? ''}`,
        patient: item.patient,
        detail: detailOf(kind, item),
        link: linkOf(kinds[kind], item),
      })),
    ),
  );
  protected readonly left = computed(() => {
    const groups = valueOf(this.#resource)?.groups ?? [];
    return groups.reduce((sum, { total, items }) => sum + total - items.length, 0);
  });

  constructor() {
    const live = inject(LiveChanges);
    // A class signs many records at once: those may wait a little.
    merge(live.of(['range']), live.of(['visit']).pipe(auditTime(visitsWaitMs)))
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.reload());
  }

  protected reload(): void {
    this.#resource.reload();
  }
}

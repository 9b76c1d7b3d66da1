import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { type RangeFlag, factWords } from '@shared/clinical/range-flags';
import type { PrescribingTask, TaskKind } from '@shared/contracts/prescriptions-waiting-contract';
import { LiveChanges } from '../../core/live-changes';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import type { IconName } from '../../ui/icon/icon-names';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { formatDay } from '../../ui/words/dates';
import { TodayClient } from '../today-client';

interface Kind {
  readonly heading: string;
  readonly explains: string;
  readonly icon: IconName;
  readonly action: string;
  /** Whether one goes on from the range that there is, rather than to a new worksheet. */
  readonly opens: 'range' | 'new';
}

const kinds: Readonly<Record<TaskKind, Kind>> = {
  withdrawn: {
    heading: 'Range withdrawn',
    explains: 'Effort leads and the ceiling stays until a new range is signed.',
    icon: 'priority-high',
    action: 'Write a new one',
    opens: 'new',
  },
  'without-range': {
    heading: 'In a course without a range',
    explains: 'Nothing is in force and nothing is written yet.',
    icon: 'add',
    action: 'Write one',
    opens: 'new',
  },
  unsigned: {
    heading: 'Drafts not signed',
    explains: 'Written, and in force for nobody.',
    icon: 'draw',
    action: 'Open',
    opens: 'range',
  },
  'awaiting-physician': {
    heading: 'Waiting for a physician',
    explains: 'Signed by staff. Not in force until a physician signs too.',
    icon: 'hourglass',
    action: 'Open',
    opens: 'range',
  },
  'review-due': {
    heading: 'Review due',
    explains: 'Older than the policy’s days of review. The range stays in force.',
    icon: 'schedule',
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

function detailOf(kind: TaskKind, { since, by, flags, patient }: PrescribingTask): string {
  const day = since === null ? '' : formatDay(since, patient.site.timeZone);
  switch (kind) {
    case 'withdrawn':
      return reasonsOf(flags, 'withdrawn');
    case 'without-range':
      return patient.site.name;
    case 'unsigned':
      return `${by ?? ''}, ${day}`;
    case 'awaiting-physician':
      return `signed by ${by ?? ''}, ${day}`;
    case 'review-due':
      return `${reasonsOf(flags, 'review-due')}; in force since ${day}`;
  }
}

/** What a physiologist has to see to, by kind, the most urgent first. */
@Component({
  selector: 'app-tasks-section',
  imports: [EmptyState, Icon, MatButton, ProblemMessage, RouterLink, Skeleton],
  templateUrl: './tasks-section.html',
  styleUrl: './tasks-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TasksSection {
  readonly #resource = inject(TodayClient).tasks();
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly groups = computed(() =>
    valueOf(this.#resource)
      ?.groups.filter(({ total }) => total > 0)
      .map(({ kind, total, items }) => ({
        ...kinds[kind],
        kind,
        total,
        items: items.map((item) => ({
          key: item.prescriptionId ?? item.patient.id,
          patient: item.patient,
          detail: detailOf(kind, item),
          link:
            kinds[kind].opens === 'range' && item.prescriptionId
              ? ['/prescriptions', item.prescriptionId]
              : ['/patients', item.patient.id, 'prescriptions', 'new'],
        })),
      })),
  );

  constructor() {
    inject(LiveChanges)
      .of(['range', 'visit'])
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.reload());
  }

  protected reload(): void {
    this.#resource.reload();
  }
}

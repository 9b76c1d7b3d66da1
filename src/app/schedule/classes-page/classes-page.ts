import {
  ChangeDetectionStrategy,
  Component,
  Injector,
  afterNextRender,
  computed,
  inject,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { ClassTemplate, SavedClassTemplate } from '@shared/contracts/class-templates-contract';
import { weekdaysOfRule } from '@shared/scheduling/weekly-rule';
import { Notices } from '../../core/notices';
import { toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { clockOf, dateInWords } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { ClassForm } from '../class-form/class-form';
import { kindWords } from '../class-words';
import { Closures } from '../closures/closures';
import { ScheduleClient } from '../schedule-client';
import { SiteChoice } from '../site-choice';
import { SitePicker } from '../site-picker/site-picker';
import { weekdays } from '../weeks';

function daysInWords(recurrence: string): string {
  const days = weekdaysOfRule(recurrence);
  if (days === null) return recurrence;
  return weekdays
    .filter(({ day }) => days.includes(day))
    .map(({ short }) => short)
    .join(', ');
}

/** The classes of a site and the days on which it is closed. */
@Component({
  selector: 'app-classes-page',
  imports: [
    ClassForm,
    Closures,
    EmptyState,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    SitePicker,
    Skeleton,
  ],
  templateUrl: './classes-page.html',
  styleUrl: './classes-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClassesPage {
  readonly #notices = inject(Notices);
  readonly #injector = inject(Injector);
  protected readonly choice = inject(SiteChoice);

  readonly #classes = inject(ScheduleClient).classTemplates(() => this.choice.site()?.id);
  protected readonly loading = computed(() => this.problem() === null && !this.#classes.hasValue());
  protected readonly prices = computed(() =>
    this.#classes.hasValue() ? this.#classes.value().prices : [],
  );
  protected readonly rows = computed(() =>
    (this.#classes.hasValue() ? this.#classes.value().items : []).map((template) => ({
      template,
      kind: kindWords[template.kind],
      days: daysInWords(template.recurrence),
      start: clockOf(template.localStart),
      ended: template.endsOn !== null && template.endsOn < this.choice.today(),
      until: template.endsOn && dateInWords(template.endsOn, 'full'),
    })),
  );
  protected readonly problem = computed(() => {
    const error = this.#classes.error();
    return this.choice.problem() ?? (error ? toProblem(error) : null);
  });

  /** The class that the form changes, 'new' for another, null while it is shut. */
  protected readonly editing = signal<ClassTemplate | 'new' | null>(null);
  protected readonly edited = computed(() => {
    const editing = this.editing();
    return editing === 'new' ? null : editing;
  });

  protected edit(template: ClassTemplate | 'new'): void {
    this.editing.set(template);
    afterNextRender(() => document.getElementById('class-form')?.focus(), {
      injector: this.#injector,
    });
  }

  protected async saved({ template, keptPlaces }: SavedClassTemplate): Promise<void> {
    this.editing.set(null);
    this.#classes.reload();
    const kept = keptPlaces.map(({ localDate }) => dateInWords(localDate, 'short')).join(', ');
    await this.#notices.say(
      kept === ''
        ? `${template.name} is saved.`
        : `${template.name} is saved. More patients than places are booked on ${kept}: those dates keep theirs.`,
    );
  }
}

import { MediaMatcher } from '@angular/cdk/layout';
import {
  ChangeDetectionStrategy,
  Component,
  Injector,
  afterNextRender,
  computed,
  effect,
  inject,
  input,
  linkedSignal,
} from '@angular/core';
import { MatButton, MatIconButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { addDays } from '@shared/scheduling/wall-time';
import { toProblem } from '../../core/problem';
import { Timetable } from '../../core/timetable';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { BookingAccess } from '../booking-access';
import { ClassPanel } from '../class-panel/class-panel';
import { SiteChoice } from '../site-choice';
import { SitePicker } from '../site-picker/site-picker';
import { WeekGrid } from '../week-grid/week-grid';
import { WeekList } from '../week-list/week-list';
import { mondayOf } from '../weeks';

/** How far ahead the panel looks for another class with a place. */
const daysAtHand = 14;

/** A site's week of classes, as a grid or a list, and the class that is open beside it. */
@Component({
  selector: 'app-schedule-page',
  imports: [
    ClassPanel,
    Icon,
    MatButton,
    MatIconButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    SitePicker,
    Skeleton,
    WeekGrid,
    WeekList,
  ],
  templateUrl: './schedule-page.html',
  styleUrl: './schedule-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SchedulePage {
  readonly #router = inject(Router);
  readonly #injector = inject(Injector);
  readonly #media = inject(MediaMatcher);
  protected readonly choice = inject(SiteChoice);
  protected readonly access = inject(BookingAccess);

  /** A site to show, from the address; the one chosen last without. */
  readonly site = input<string>();
  /** A date of the week to show, from the address; this week without. */
  readonly day = input<string>();
  /** The class date that is open, from the address. */
  readonly class = input<string>();

  protected readonly week = computed(() => mondayOf(this.day() ?? this.choice.today()));
  protected readonly heading = computed(() => {
    const last = addDays(this.week(), 6);
    return `${dateInWords(this.week(), 'short')} to ${dateInWords(last, 'short')}`;
  });

  readonly #dates = inject(Timetable).classDates(() => {
    const site = this.choice.site();
    const from = this.week();
    return site && { siteId: site.id, from, to: addDays(from, daysAtHand) };
  });
  protected readonly loading = computed(() => !this.#dates.hasValue() && this.problem() === null);
  protected readonly atHand = computed(() => (this.#dates.hasValue() ? this.#dates.value() : []));
  protected readonly dates = computed(() => {
    const next = addDays(this.week(), 7);
    return this.atHand().filter(({ localDate }) => localDate < next);
  });
  protected readonly open = computed(() => this.atHand().find(({ id }) => id === this.class()));
  protected readonly problem = computed(() => {
    const error = this.#dates.error();
    return this.choice.problem() ?? (error ? toProblem(error) : null);
  });

  /** A phone has no room for seven columns. */
  protected readonly view = linkedSignal<'grid' | 'list'>(() =>
    this.#media.matchMedia('(min-width: 900px)').matches ? 'grid' : 'list',
  );

  constructor() {
    effect(() => {
      const site = this.site();
      if (site !== undefined) this.choice.choose(site);
    });
  }

  protected reload(): void {
    this.#dates.reload();
  }

  protected async show(day: string): Promise<void> {
    await this.#goTo({ day, class: null });
  }

  protected async openClass(id: string): Promise<void> {
    const date = this.atHand().find((one) => one.id === id);
    await this.#goTo({ class: id, ...(date && { day: date.localDate }) });
    afterNextRender(() => document.getElementById('class-panel')?.focus(), {
      injector: this.#injector,
    });
  }

  protected async closeClass(): Promise<void> {
    await this.#goTo({ class: null });
  }

  protected readonly addDays = addDays;

  async #goTo(queryParams: Record<string, string | null>): Promise<void> {
    await this.#router.navigate([], { queryParams, queryParamsHandling: 'merge' });
  }
}

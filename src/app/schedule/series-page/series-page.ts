import {
  ChangeDetectionStrategy,
  Component,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  linkedSignal,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PatientListItem } from '@shared/contracts/patients-contract';
import type { PlannedDate } from '@shared/contracts/schedule-contract';
import { Bookings } from '../../core/bookings';
import { type Problem, toProblem } from '../../core/problem';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords } from '../../ui/site-time/site-time';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { PatientSearch } from '../patient-search/patient-search';
import { ScheduleClient } from '../schedule-client';
import { SeriesAskForm, type SeriesAsk } from '../series-ask-form/series-ask-form';
import { SeriesPlan } from '../series-plan/series-plan';
import { SiteChoice } from '../site-choice';
import { SitePicker } from '../site-picker/site-picker';
import { type SayBack, sayBack } from './say-back';
import { type SeriesChoice, chosenIds, initialChoice } from './series-choice';

interface Plan {
  readonly ask: SeriesAsk;
  readonly siteId: string;
  readonly dates: readonly PlannedDate[];
}

/** A caller on the phone: find them, find their days, book all at once, and say it back. */
@Component({
  selector: 'app-series-page',
  imports: [
    MatButton,
    PageHeader,
    PatientSearch,
    ProblemMessage,
    RouterLink,
    SeriesAskForm,
    SeriesPlan,
    SitePicker,
    Skeleton,
  ],
  templateUrl: './series-page.html',
  styleUrl: './series-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SeriesPage {
  readonly #client = inject(ScheduleClient);
  readonly #bookings = inject(Bookings);
  readonly #router = inject(Router);
  readonly #injector = inject(Injector);
  protected readonly choice = inject(SiteChoice);

  /** Whom to book, from the address. */
  readonly patient = input<string>();

  readonly #person = this.#client.patient(() => this.patient());
  protected readonly person = computed(() =>
    this.#person.hasValue() ? this.#person.value() : undefined,
  );
  protected readonly birthDate = computed(() => {
    const person = this.person();
    return person && dateInWords(person.birthDate, 'full');
  });
  /** Places that the running course may still hold; null without a course. */
  protected readonly courseLeft = computed(() => {
    const course = this.person()?.enrollments.find(({ status }) => status === 'active');
    return course ? course.sessionLimit - course.booked : null;
  });

  readonly #planned = signal<Plan | null>(null);
  /** A plan is one patient's at one site: another of either, and it is gone. */
  protected readonly plan = computed(() => {
    const plan = this.#planned();
    return plan?.siteId === this.choice.site()?.id ? plan : null;
  });
  protected readonly chosen = linkedSignal<SeriesChoice>(() =>
    initialChoice(this.plan()?.dates ?? []),
  );
  protected readonly ids = computed(() => chosenIds(this.plan()?.dates ?? [], this.chosen()));
  protected readonly said = signal<SayBack | null>(null);
  protected readonly busy = signal(false);
  readonly #failed = signal<Problem | null>(null);
  protected readonly problem = computed(() => {
    const error = this.#person.error();
    return this.#failed() ?? this.choice.problem() ?? (error ? toProblem(error) : null);
  });

  protected async pick(person: PatientListItem | null): Promise<void> {
    this.#planned.set(null);
    this.said.set(null);
    this.#failed.set(null);
    await this.#router.navigate([], { queryParams: { patient: person?.id ?? null } });
  }

  protected async find(ask: SeriesAsk): Promise<void> {
    const [patientId, site] = [this.patient(), this.choice.site()];
    if (patientId === undefined || site === undefined) return;
    await this.#try(async () => {
      const dates = await this.#client.previewSeries({ ...ask, patientId, siteId: site.id });
      this.#planned.set({ ask, siteId: site.id, dates });
      this.#focus('plan-heading');
    });
  }

  protected async book(): Promise<void> {
    const [patientId, plan, site] = [this.patient(), this.plan(), this.choice.site()];
    if (patientId === undefined || plan === null || site === undefined) return;
    await this.#try(async () => {
      try {
        const booked = await this.#bookings.bookSeries({ patientId, classDateIds: this.ids() });
        this.said.set(sayBack(booked, plan.ask, site.timeZone));
        this.#focus('said-heading');
      } catch (error) {
        // Someone was quicker: the plan shows what is free now, beside what went wrong.
        const dates = await this.#client.previewSeries({ ...plan.ask, patientId, siteId: site.id });
        this.#planned.set({ ...plan, dates });
        throw error;
      }
    });
  }

  protected again(): void {
    this.#planned.set(null);
    this.said.set(null);
    this.#person.reload();
  }

  async #try(work: () => Promise<void>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.#failed.set(null);
    try {
      await work();
    } catch (error) {
      this.#failed.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }

  #focus(id: string): void {
    afterNextRender(() => document.getElementById(id)?.focus(), { injector: this.#injector });
  }
}

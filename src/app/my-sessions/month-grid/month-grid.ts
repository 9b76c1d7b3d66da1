import {
  ChangeDetectionStrategy,
  Component,
  ViewEncapsulation,
  computed,
  effect,
  input,
  output,
  viewChild,
} from '@angular/core';
import { FullCalendarComponent, FullCalendarModule } from '@fullcalendar/angular';
import type { CalendarOptions, EventInput } from '@fullcalendar/core';
import dayGrid from '@fullcalendar/daygrid';
import interaction from '@fullcalendar/interaction';
import { localDateAt } from '@shared/scheduling/wall-time';
import { dateInWords } from '../../ui/site-time/site-time';
import type { DayState } from '../bookable-days';

function dayInWords({ localDate, free, booked }: DayState): string {
  const places = free === 0 ? 'no free class' : `${free} free`;
  return `${dateInWords(localDate, 'long')}, ${booked ? 'you have a session, ' : ''}${places}`;
}

/** A month: on each day how many classes are free, and where one's own sessions are. Each day's number opens it. */
@Component({
  selector: 'app-month-grid',
  imports: [FullCalendarModule],
  template: `<full-calendar [options]="options()" [events]="events()" />`,
  styleUrl: './month-grid.scss',
  encapsulation: ViewEncapsulation.None,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MonthGrid {
  private readonly calendar = viewChild.required(FullCalendarComponent);

  /** The first of a month. */
  readonly month = input.required<string>();
  readonly days = input.required<readonly DayState[]>();
  readonly selected = input<string | null>(null);
  readonly chosen = output<string>();

  readonly #byDate = computed(() => new Map(this.days().map((day) => [day.localDate, day])));

  protected readonly events = computed<EventInput[]>(() =>
    this.days().flatMap(({ localDate, free, booked }) => [
      ...(booked ? [{ start: localDate, title: 'Yours', classNames: ['yours'], order: 1 }] : []),
      ...(free > 0 ? [{ start: localDate, title: `${free} free`, order: 2 }] : []),
    ]),
  );

  protected readonly options = computed<CalendarOptions>(() => ({
    plugins: [dayGrid, interaction],
    initialView: 'dayGridMonth',
    initialDate: this.month(),
    // Whole days alone are shown here, and they are the site's already.
    timeZone: 'UTC',
    headerToolbar: false,
    height: 'auto',
    stickyHeaderDates: false,
    fixedWeekCount: false,
    showNonCurrentDates: false,
    eventInteractive: false,
    eventOrder: 'order',
    navLinks: true,
    navLinkHint: () => '',
    navLinkDayClick: (date) => this.chosen.emit(localDateAt(date, 'UTC')),
    dateClick: ({ dateStr }) => this.chosen.emit(dateStr),
    eventClick: ({ event }) => this.chosen.emit(event.startStr),
    dayHeaderFormat: { weekday: 'short' },
    dayCellClassNames: ({ date }) =>
      localDateAt(date, 'UTC') === this.selected() ? ['selected'] : [],
    dayCellDidMount: ({ el, date }) => this.#label(el, localDateAt(date, 'UTC')),
  }));

  constructor() {
    effect(() => {
      const month = this.month();
      this.calendar().getApi()?.gotoDate(month);
    });
    effect(() => {
      // Cells stay while their numbers change, so their words are set anew.
      const known = this.#byDate();
      const root = this.calendar().getApi()?.el;
      for (const cell of root?.querySelectorAll<HTMLElement>('[data-date]') ?? []) {
        this.#label(cell, cell.dataset['date'] ?? '', known);
      }
    });
  }

  #label(cell: HTMLElement, localDate: string, known = this.#byDate()): void {
    const link = cell.querySelector('.fc-daygrid-day-number');
    const day = known.get(localDate) ?? { localDate, free: 0, booked: false };
    // The calendar makes it an anchor that leads nowhere and takes Enter and Space: a button.
    link?.setAttribute('role', 'button');
    link?.setAttribute('aria-label', dayInWords(day));
    link?.removeAttribute('title');
  }
}

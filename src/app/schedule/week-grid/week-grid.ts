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
import type { CalendarOptions, EventContentArg, EventInput } from '@fullcalendar/core';
import interaction from '@fullcalendar/interaction';
import luxon from '@fullcalendar/luxon3';
import timeGrid from '@fullcalendar/timegrid';
import type { ClassDate } from '@shared/contracts/schedule-contract';
import { clockOf, dateInWords } from '../../ui/site-time/site-time';
import { classState, monitorsInWords, placesInWords } from '../class-words';

/** What a class shows in its box of the grid. */
interface Box {
  readonly start: string;
  readonly name: string;
  readonly places: string;
  readonly monitors: string | null;
  readonly state: string | null;
  readonly label: string;
}

function boxOf(date: ClassDate): Box {
  const start = clockOf(date.localStart);
  const monitors = monitorsInWords(date);
  const state = classState(date)?.words ?? null;
  const day = dateInWords(date.localDate, 'long');
  const words = [`${date.name}, ${day}, ${start}`, placesInWords(date), monitors, state];
  return {
    start,
    name: date.name,
    places: `${date.booked} of ${date.capacity} places`,
    monitors:
      date.monitoredCapacity > 0
        ? `${date.monitoredBooked} of ${date.monitoredCapacity} monitored`
        : monitors,
    state,
    label: words.filter((part) => part !== null).join('. '),
  };
}

function hourOf(localTime: string): number {
  return Number(localTime.slice(0, 2));
}

const fullHour = (hour: number) => `${String(hour).padStart(2, '0')}:00:00`;

/**
 * The classes of a week in a time grid, by the site's clock. Every class is a link that Tab reaches and Enter opens; nothing
 * is dragged. The list shows the same.
 */
@Component({
  selector: 'app-week-grid',
  imports: [FullCalendarModule],
  template: `
    <full-calendar [options]="options()" [events]="events()">
      <ng-template #eventContent let-arg>
        @let box = boxIn(arg);
        <span class="start num">{{ box.start }}</span>
        <span class="name">{{ box.name }}</span>
        <span class="num">{{ box.places }}</span>
        @if (box.monitors) {
          <span class="num">{{ box.monitors }}</span>
        }
        @if (box.state) {
          <span class="state">{{ box.state }}</span>
        }
      </ng-template>
    </full-calendar>
  `,
  styleUrl: './week-grid.scss',
  encapsulation: ViewEncapsulation.None,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WeekGrid {
  private readonly calendar = viewChild.required(FullCalendarComponent);

  /** A Monday. */
  readonly week = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly dates = input.required<readonly ClassDate[]>();
  readonly selectedId = input<string | undefined>();
  readonly chosen = output<string>();

  protected readonly events = computed<EventInput[]>(() =>
    this.dates().map((date) => ({
      id: date.id,
      title: date.name,
      start: date.startsAt,
      end: date.endsAt,
      classNames: [
        ...(classState(date) ? ['taken'] : []),
        ...(date.id === this.selectedId() ? ['selected'] : []),
      ],
      extendedProps: { box: boxOf(date) },
    })),
  );

  readonly #hours = computed(() => {
    const starts = this.dates().map(({ localStart }) => hourOf(localStart));
    return { first: Math.min(7, ...starts), last: Math.max(19, ...starts.map((hour) => hour + 2)) };
  });

  protected readonly options = computed<CalendarOptions>(() => ({
    plugins: [timeGrid, interaction, luxon],
    initialView: 'timeGridWeek',
    initialDate: this.week(),
    timeZone: this.timeZone(),
    firstDay: 1,
    headerToolbar: false,
    allDaySlot: false,
    height: 'auto',
    stickyHeaderDates: false,
    expandRows: true,
    nowIndicator: true,
    slotEventOverlap: false,
    eventInteractive: true,
    slotDuration: '01:00:00',
    slotMinTime: fullHour(this.#hours().first),
    slotMaxTime: fullHour(Math.min(24, this.#hours().last)),
    slotLabelFormat: { hour: 'numeric', meridiem: 'short' },
    dayHeaderFormat: { weekday: 'short', month: 'short', day: 'numeric' },
    eventClick: ({ event, jsEvent }) => {
      jsEvent.preventDefault();
      this.chosen.emit(event.id);
    },
    eventDidMount: (arg) => {
      arg.el.setAttribute('role', 'button');
      arg.el.setAttribute('aria-label', this.boxIn(arg).label);
    },
  }));

  protected boxIn({ event }: Pick<EventContentArg, 'event'>): Box {
    return (event.extendedProps as { box: Box }).box;
  }

  constructor() {
    effect(() => {
      const week = this.week();
      // The calendar takes its first date from the options, later ones only by this call.
      this.calendar().getApi()?.gotoDate(week);
    });
  }
}

import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  Injector,
  afterNextRender,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { addDays, localDateAt } from '@shared/scheduling/wall-time';
import { toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { Timetable } from '../../core/timetable';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { classToOpen, inOrderOfUse, momentOf } from '../class-choice';
import { EntryQueue } from '../entry-queue/entry-queue';
import { FloorBoard } from '../floor-board';
import { clockText } from '../floor-time';
import { FloorTile } from '../floor-tile/floor-tile';
import { ReadingDrafts } from '../reading-drafts';
import { VisitPanel } from '../visit-panel/visit-panel';
import { attentionIn } from '../visit/attention';
import { SiteMemory } from './site-memory';

const momentWords = { now: 'Now', next: 'Later today', earlier: 'Earlier today' } as const;

/** A class on the floor: a tile a patient, what needs attention above, and the pad of the patient that is open. */
@Component({
  selector: 'app-floor-page',
  imports: [
    EmptyState,
    FloorTile,
    Icon,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
    VisitPanel,
  ],
  providers: [FloorBoard, ReadingDrafts],
  templateUrl: './floor-page.html',
  styleUrl: './floor-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FloorPage {
  readonly #timetable = inject(Timetable);
  readonly #document = inject(DOCUMENT);
  readonly #injector = inject(Injector);
  readonly #router = inject(Router);
  readonly #memory = inject(SiteMemory);
  readonly #session = inject(Session);
  protected readonly board = inject(FloorBoard);
  protected readonly queue = inject(EntryQueue);

  /** The class that the address names; without one the class that is on opens. */
  readonly class = input<string>();

  protected readonly sites = this.#timetable.sites();
  readonly #siteId = signal(this.#memory.site());
  protected readonly site = computed(() => {
    const sites = this.sites.hasValue() ? this.sites.value() : [];
    return sites.find(({ id }) => id === this.#siteId()) ?? sites[0];
  });
  protected readonly timeZone = computed(() => this.site()?.timeZone ?? 'UTC');
  readonly #today = computed(() => localDateAt(this.board.now(), this.timeZone()));
  protected readonly classDates = this.#timetable.classDates(() => {
    const site = this.site();
    const from = this.#today();
    return site && { siteId: site.id, from, to: addDays(from, 1) };
  });
  readonly #classes = computed(() => {
    const all = this.classDates.hasValue() ? this.classDates.value() : [];
    return all.filter(({ kind, status }) => kind === 'exercise' && status === 'scheduled');
  });
  protected readonly loadProblem = computed(() => {
    const error = this.sites.error() ?? this.classDates.error();
    return error ? toProblem(error) : null;
  });
  protected readonly groups = computed(() => {
    const now = this.board.now();
    const ordered = inOrderOfUse(this.#classes(), now);
    return (['now', 'next', 'earlier'] as const)
      .map((moment) => ({
        label: momentWords[moment],
        classes: ordered
          .filter((one) => momentOf(one, now) === moment)
          .map((one) => ({
            id: one.id,
            text: `${clockText(one.startsAt, this.timeZone())} ${one.name}`,
          })),
      }))
      .filter(({ classes }) => classes.length > 0);
  });
  /** The choice stands until another is made: a class that ends does not turn the page by itself. */
  readonly #opened = signal<string | null>(null);
  protected readonly classDate = computed(() => {
    const classes = this.#classes();
    const wanted = this.class() ?? this.#opened();
    return classes.find(({ id }) => id === wanted);
  });

  readonly #classDateId = computed(() => this.classDate()?.id);

  protected readonly clock = computed(() => clockText(this.board.now(), this.timeZone()));
  protected readonly heading = computed(() => {
    const one = this.classDate();
    return one ? `${one.name}, ${clockText(one.startsAt, this.timeZone())}` : 'Floor';
  });
  protected readonly detail = computed(() => {
    const visits = this.board.visits();
    const here = visits.filter(({ status }) => status !== 'booked' && status !== 'noshow').length;
    return this.classDate() && this.board.loaded()
      ? `${this.site()?.name} · ${here} of ${visits.length} here`
      : (this.site()?.name ?? null);
  });
  protected readonly attention = computed(() => {
    const now = this.board.now();
    const over = Date.parse(this.classDate()?.endsAt ?? '') <= now.getTime();
    return attentionIn(this.board.visits(), now, over);
  });
  protected readonly canWrite = computed(() =>
    this.#session.roles().some((role) => role === 'nurse' || role === 'exercise-physiologist'),
  );
  protected readonly lostAt = computed(() => {
    const at = this.board.reachedAt();
    return this.board.connected() || at === null ? null : clockText(at, this.timeZone());
  });

  readonly #selectedId = signal<string | null>(null);
  protected readonly selected = computed(() =>
    this.board.visits().find(({ appointmentId }) => appointmentId === this.#selectedId()),
  );
  private readonly panel = viewChild(VisitPanel);

  constructor() {
    effect(() => {
      const classes = this.#classes();
      untracked(() => {
        if (this.class() === undefined && !classes.some(({ id }) => id === this.#opened())) {
          this.#opened.set(classToOpen(classes, this.board.now())?.id ?? null);
        }
      });
    });
    effect(() => {
      const id = this.#classDateId();
      if (id === undefined) return;
      untracked(() => {
        this.#selectedId.set(null);
        void this.board.open(id);
      });
    });
  }

  protected chooseSite(event: Event): void {
    const { value } = event.target as HTMLSelectElement;
    this.#siteId.set(value);
    this.#memory.keep(value);
    void this.#router.navigate([], { queryParams: {} });
  }

  protected chooseClass(event: Event): void {
    const { value } = event.target as HTMLSelectElement;
    void this.#router.navigate([], { queryParams: { class: value } });
  }

  protected open(appointmentId: string): void {
    this.#selectedId.set(appointmentId);
    afterNextRender(() => this.panel()?.focus(), { injector: this.#injector });
  }

  protected close(): void {
    const id = this.#selectedId();
    this.#selectedId.set(null);
    afterNextRender(
      () => this.#document.querySelector<HTMLElement>(`[data-visit="${id}"] button`)?.focus(),
      { injector: this.#injector },
    );
  }

  protected again(): void {
    this.sites.reload();
    this.classDates.reload();
    void this.board.reload();
  }
}

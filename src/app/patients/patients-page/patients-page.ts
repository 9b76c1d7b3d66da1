import { BreakpointObserver } from '@angular/cdk/layout';
import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type ElementRef,
  computed,
  inject,
  signal,
  viewChildren,
} from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel, MatPrefix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import type {
  PatientFlag,
  PatientListItem,
  PatientSearchResponse,
} from '@shared/contracts/patients-contract';
import {
  type Observable,
  Subject,
  catchError,
  debounceTime,
  distinctUntilChanged,
  map,
  merge,
  of,
  startWith,
  switchMap,
  tap,
} from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { flagWords } from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';
import { ceilingWords, rangeWords } from '../../ui/words/range-words';
import { PatientAccess } from '../patient-access';
import { PatientSearch } from '../patient-search';
import { PatientsClient } from '../patients-client';

const typingPauseMs = 200;

type Answer = PatientSearchResponse | { readonly problem: Problem };

/** The list of patients: search as one types, arrows through the rows, a page at a time. */
@Component({
  selector: 'app-patients-page',
  imports: [
    EmptyState,
    Icon,
    MatButton,
    MatFormField,
    MatInput,
    MatLabel,
    MatPrefix,
    PageHeader,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './patients-page.html',
  styleUrl: './patients-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PatientsPage {
  readonly #client = inject(PatientsClient);
  readonly #search = inject(PatientSearch);
  readonly #destroyRef = inject(DestroyRef);
  readonly #again = new Subject<void>();
  protected readonly access = inject(PatientAccess);

  protected readonly query = new FormControl(this.#search.query, { nonNullable: true });
  /** Null until the first answer. */
  protected readonly items = signal<readonly PatientListItem[] | null>(null);
  protected readonly nextCursor = signal<string | null>(null);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly loadingMore = signal(false);
  protected readonly searched = signal('');

  protected readonly wide = toSignal(
    inject(BreakpointObserver)
      .observe('(min-width: 900px)')
      .pipe(map(({ matches }) => matches)),
    { requireSync: true },
  );
  protected readonly links = viewChildren<ElementRef<HTMLAnchorElement>>('link');
  protected readonly count = computed(() => {
    const items = this.items();
    if (items === null) return '';
    if (items.length === 0) return 'No patient found';
    const more = this.nextCursor() === null ? '' : ', and more';
    return `${items.length} ${items.length === 1 ? 'patient' : 'patients'}${more}`;
  });

  constructor() {
    const typed = this.query.valueChanges.pipe(
      debounceTime(typingPauseMs),
      map((query) => query.trim()),
      startWith(this.query.value.trim()),
      distinctUntilChanged(),
    );
    merge(typed, this.#again.pipe(map(() => this.query.value.trim())))
      .pipe(
        tap((query) => (this.#search.query = query)),
        switchMap((query) => this.#page(query, null).pipe(map((answer) => ({ query, answer })))),
        takeUntilDestroyed(),
      )
      .subscribe(({ query, answer }) => this.#show(query, answer));
  }

  protected readonly rangeWords = rangeWords;
  protected readonly ceilingWords = ceilingWords;
  protected readonly date = formatLocalDate;

  protected readonly flag = (flag: PatientFlag): { words: string; tone: Tone } => ({
    words: flagWords[flag],
    tone: flag === 'range-withdrawn' ? 'over' : flag === 'no-course' ? 'plain' : 'due',
  });

  protected course({ course }: PatientListItem): string | null {
    if (course === null) return null;
    const { status, attended, planned } = course;
    if (status === 'completed' || status === 'discontinued') {
      return `Ended after ${attended} of ${planned}`;
    }
    return `Session ${attended} of ${planned}`;
  }

  protected tryAgain(): void {
    this.problem.set(null);
    this.#again.next();
  }

  protected showMore(): void {
    const cursor = this.nextCursor();
    if (cursor === null || this.loadingMore()) return;
    const query = this.searched();
    this.loadingMore.set(true);
    this.#page(query, cursor)
      .pipe(takeUntilDestroyed(this.#destroyRef))
      .subscribe((answer) => {
        this.loadingMore.set(false);
        if (query !== this.searched()) return;
        if ('problem' in answer) return this.problem.set(answer.problem);
        const from = this.items()?.length ?? 0;
        this.items.update((items) => [...(items ?? []), ...answer.items]);
        this.nextCursor.set(answer.nextCursor);
        setTimeout(() => this.links()[from]?.nativeElement.focus());
      });
  }

  /** Down from the field into the rows, up and down between them, back into the field above the first. */
  protected move(event: Event, by: 1 | -1, field: HTMLInputElement): void {
    const links = this.links().map(({ nativeElement }) => nativeElement);
    const at = links.indexOf(event.target as HTMLAnchorElement);
    const next = links[at + by];
    event.preventDefault();
    if (next) next.focus();
    else if (at + by < 0) field.focus();
  }

  /** Enter in the field opens the first of what is shown. */
  protected openFirst(event: Event): void {
    event.preventDefault();
    if (this.query.value.trim() === this.searched()) this.links()[0]?.nativeElement.click();
  }

  #page(query: string, cursor: string | null): Observable<Answer> {
    return this.#client
      .search({ ...(query !== '' && { q: query }), cursor })
      .pipe(catchError((error: unknown) => of({ problem: toProblem(error) })));
  }

  #show(query: string, answer: Answer): void {
    if ('problem' in answer) return this.problem.set(answer.problem);
    this.problem.set(null);
    this.searched.set(query);
    this.items.set(answer.items);
    this.nextCursor.set(answer.nextCursor);
  }
}

import { type DestroyRef, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import type { Observable, Subscription } from 'rxjs';
import { type Problem, toProblem } from './problem';

interface Page<T> {
  readonly items: readonly T[];
  readonly nextCursor: string | null;
}

/** A list that is read a page at a time, each added below; what failed is tried again from where it stood. */
export class PagedList<T> {
  readonly #items = signal<readonly T[] | null>(null);
  readonly #nextCursor = signal<string | null>(null);
  readonly #problem = signal<Problem | null>(null);
  readonly #loading = signal(false);
  #reading: Subscription | undefined;

  /** Null until the first page is there. */
  readonly items = this.#items.asReadonly();
  readonly nextCursor = this.#nextCursor.asReadonly();
  readonly problem = this.#problem.asReadonly();
  readonly loading = this.#loading.asReadonly();

  constructor(
    readonly read: (cursor: string | null) => Observable<Page<T>>,
    readonly destroyRef: DestroyRef,
  ) {}

  /** Reads the next page, the first when there is none yet. */
  load(): void {
    if (this.#loading()) return;
    this.#loading.set(true);
    this.#problem.set(null);
    this.#reading = this.read(this.#nextCursor())
      .pipe(takeUntilDestroyed(this.destroyRef))
      .subscribe({
        next: (page) => {
          this.#items.update((items) => [...(items ?? []), ...page.items]);
          this.#nextCursor.set(page.nextCursor);
          this.#loading.set(false);
        },
        error: (error: unknown) => {
          this.#problem.set(toProblem(error));
          this.#loading.set(false);
        },
      });
  }

  /** Begins anew, as after another choice of what to list; an answer still under way is dropped. */
  restart(): void {
    this.#reading?.unsubscribe();
    this.#loading.set(false);
    this.#items.set(null);
    this.#nextCursor.set(null);
    this.load();
  }
}

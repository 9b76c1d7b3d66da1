import { signal } from '@angular/core';
import { firstValueFrom, type Observable } from 'rxjs';
import { type Problem, toProblem } from '../core/problem';

/** A list that is read a page at a time; `items` is null until the first has come. */
export class PagedList<T> {
  readonly #items = signal<readonly T[] | null>(null);
  readonly #problem = signal<Problem | null>(null);
  readonly #next = signal<string | null>(null);
  readonly #loading = signal(false);
  /** Counts the beginnings, so that an answer to a former question is dropped. */
  #beginning = 0;

  readonly items = this.#items.asReadonly();
  readonly problem = this.#problem.asReadonly();
  readonly next = this.#next.asReadonly();
  readonly loading = this.#loading.asReadonly();

  constructor(
    private readonly read: (cursor: string | null) => Observable<{
      readonly items: readonly T[];
      readonly nextCursor: string | null;
    }>,
  ) {}

  /** Starts anew from the first page. */
  async begin(): Promise<void> {
    this.#beginning += 1;
    this.#items.set(null);
    await this.#load(null);
  }

  async more(): Promise<void> {
    if (!this.#loading()) await this.#load(this.#next());
  }

  async #load(cursor: string | null): Promise<void> {
    const mine = this.#beginning;
    this.#loading.set(true);
    this.#problem.set(null);
    try {
      const page = await firstValueFrom(this.read(cursor));
      if (mine !== this.#beginning) return;
      this.#items.update((before) => [...(before ?? []), ...page.items]);
      this.#next.set(page.nextCursor);
    } catch (error) {
      if (mine === this.#beginning) this.#problem.set(toProblem(error));
    } finally {
      if (mine === this.#beginning) this.#loading.set(false);
    }
  }
}

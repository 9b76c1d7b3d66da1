import { signal } from '@angular/core';
import type { AbstractControl } from '@angular/forms';
import { type Problem, toProblem } from '../../core/problem';
import { showFieldErrors } from '../field-error/zod-validator';

/** Failures without field errors that belong beside a field all the same: its name by the failure's code. */
type FieldOfCode = Readonly<Record<string, { readonly field: string; readonly message?: string }>>;

/** Sends a form, once at a time and only without faults; what is refused stands beside its field, the rest in `problem`. */
export class FormSending {
  readonly #sending = signal(false);
  readonly #problem = signal<Problem | null>(null);

  readonly sending = this.#sending.asReadonly();
  readonly problem = this.#problem.asReadonly();

  constructor(
    readonly form: AbstractControl,
    readonly fields: FieldOfCode = {},
  ) {}

  /** @returns whether it was sent and went well */
  async send(work: () => Promise<unknown>): Promise<boolean> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.#sending()) return false;
    this.#sending.set(true);
    this.#problem.set(null);
    try {
      await work();
      return true;
    } catch (error) {
      this.#show(toProblem(error));
      return false;
    } finally {
      this.#sending.set(false);
    }
  }

  #show(problem: Problem): void {
    const known = this.fields[problem.code];
    const errors = known
      ? [{ path: known.field, message: known.message ?? problem.title }]
      : problem.errors;
    const elsewhere = showFieldErrors(this.form, errors);
    if (errors.length === 0 || elsewhere.length > 0) this.#problem.set(problem);
  }
}

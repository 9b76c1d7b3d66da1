import { Injectable, computed, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import type { AbstractControl } from '@angular/forms';
import { evaluatePrescription } from '@shared/clinical/prescribing';
import type {
  MaximumMethod,
  Method,
  PrescriptionAnswer,
  PrescriptionPolicy,
  PrescriptionRequest,
} from '@shared/clinical/prescribing';
import { fieldErrors } from '@shared/contracts/field-errors';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import type { FieldError } from '@shared/errors';
import {
  type Inputs,
  type OptionalPart,
  addThreshold,
  addZone,
  fill,
  requestOf,
  worksheetForm,
} from './worksheet-form';

type Parsed =
  | { readonly ok: true; readonly request: PrescriptionRequest }
  | { readonly ok: false; readonly errors: readonly FieldError[] };

function parse(value: unknown): Parsed {
  const result = prescriptionRequestSchema.safeParse(value);
  return result.success
    ? { ok: true, request: result.data }
    : { ok: false, errors: fieldErrors(result.error) };
}

/** Every control below, by its path. */
function* controlsOf(control: AbstractControl, path = ''): Generator<[string, AbstractControl]> {
  if (path !== '') yield [path, control];
  const { controls } = control as { controls?: Record<string, AbstractControl> };
  for (const [key, child] of Object.entries(controls ?? {})) {
    yield* controlsOf(child, path === '' ? key : `${path}.${key}`);
  }
}

/** The worksheet's inputs and what they come to, worked out anew at each change by the rules that the server has too. */
@Injectable()
export class WorksheetState {
  readonly form = worksheetForm();
  readonly #value = signal<unknown>(null);
  readonly #kept = signal('');
  readonly #policy = signal<PrescriptionPolicy | null>(null);

  readonly #parsed = computed<Parsed>(() => parse(this.#value()));
  readonly #evaluation = computed(() => {
    const parsed = this.#parsed();
    const policy = this.#policy();
    return parsed.ok && policy ? evaluatePrescription(parsed.request, policy) : null;
  });

  /** The request when it is one, null while a field is at fault. */
  readonly request = computed(() => {
    const parsed = this.#parsed();
    return parsed.ok ? parsed.request : null;
  });
  /** The faults of fields, a choice that does not apply among them. */
  readonly errors = computed<readonly FieldError[]>(() => {
    const parsed = this.#parsed();
    if (!parsed.ok) return parsed.errors;
    const evaluation = this.#evaluation();
    return evaluation && !evaluation.ok ? [evaluation.error] : [];
  });
  /** What the inputs come to; null while they come to nothing. */
  readonly answer = computed<PrescriptionAnswer | null>(() => {
    const evaluation = this.#evaluation();
    return evaluation?.ok ? evaluation.answer : null;
  });
  /** The last that there was, to look at while a field is mended. */
  readonly lastAnswer = signal<PrescriptionAnswer | null>(null);
  readonly lastRequest = signal<PrescriptionRequest | null>(null);
  readonly changed = computed(() => JSON.stringify(this.#value()) !== this.#kept());
  readonly policy = this.#policy.asReadonly();
  /** The raw value, for what is said of it in words. */
  readonly value = this.#value.asReadonly();

  constructor() {
    this.form.valueChanges.pipe(takeUntilDestroyed()).subscribe(() => {
      this.#read();
    });
  }

  /** Begins with inputs, and works by a policy. */
  start(inputs: Inputs, policy: PrescriptionPolicy): void {
    this.#policy.set(policy);
    this.lastAnswer.set(null);
    this.lastRequest.set(null);
    fill(this.form, inputs);
    this.#read();
    this.keep();
  }

  /** What stands here is what the server has. */
  keep(): void {
    this.#kept.set(JSON.stringify(this.#value()));
  }

  /** Puts some parts of other inputs in the place of what stands here. */
  takeFrom(inputs: Inputs, paths: readonly string[]): void {
    const parts = paths.map((path) => [path, inputs[path as keyof Inputs]] as const);
    fill(this.form, { ...(requestOf(this.form) as Inputs), ...Object.fromEntries(parts) });
  }

  setPart(part: OptionalPart, present: boolean, initial: object = {}): void {
    const control = this.form.controls[part];
    if (present) {
      control.reset(initial, { emitEvent: false });
      control.enable();
    } else control.disable();
  }

  addThreshold(): void {
    addThreshold(this.form);
  }

  addZone(): void {
    addZone(this.form);
  }

  choose(method: Method | null, maximum: MaximumMethod | null): void {
    this.form.controls.choice.setValue({ method, maximum });
  }

  #read(): void {
    this.#value.set(requestOf(this.form));
    const answer = this.answer();
    if (answer) {
      this.lastAnswer.set(answer);
      this.lastRequest.set(this.request());
    }
    this.#showErrors();
  }

  /** Each fault stands at its control; controls without one are cleared. */
  #showErrors(): void {
    const messages = new Map(this.errors().map(({ path, message }) => [path, message]));
    for (const [path, control] of controlsOf(this.form)) {
      const rule = messages.get(path);
      const before = (control.errors as { rule?: string } | null)?.rule;
      if (rule !== before) control.setErrors(rule === undefined ? null : { rule });
    }
  }
}

import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel, MatSuffix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { decidesRanges, isFraction } from '@shared/clinical/program-policy';
import {
  type PolicyPreview,
  policyPublishRequestSchema,
} from '@shared/contracts/policy-change-contract';
import type { PolicyInForce } from '@shared/contracts/policy-in-force-contract';
import { EMPTY, firstValueFrom, startWith, switchMap } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { NumberInput } from '../../ui/number-input/number-input';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { type PolicyDraft, draftOf, policyControls } from '../policy-draft';
import { PolicyEffect } from '../policy-effect/policy-effect';
import { policyNumber } from '../policy-page/policy-number';
import { SettingsClient } from '../settings-client';

/** Writes the next version of the policy: change, see what it does to the ranges in force, say why, publish. */
@Component({
  selector: 'app-change-policy-page',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    MatSuffix,
    NumberInput,
    PageHeader,
    PolicyEffect,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    Skeleton,
  ],
  templateUrl: './change-policy-page.html',
  styleUrls: ['../settings-page.scss', './change-policy-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangePolicyPage {
  readonly #client = inject(SettingsClient);
  readonly #router = inject(Router);
  readonly #notices = inject(Notices);

  protected readonly read = this.#client.policy();
  protected readonly policy = computed(() => valueOf(this.read));
  protected readonly controls = computed(() => {
    const policy = this.policy();
    return policy?.mayChange ? policyControls(policy.items) : null;
  });
  readonly #typed = toSignal(
    toObservable(this.controls).pipe(
      switchMap((controls) =>
        controls ? controls.valueChanges.pipe(startWith(controls.value)) : EMPTY,
      ),
    ),
  );
  protected readonly draft = computed<PolicyDraft | null>(() => {
    const policy = this.policy();
    return policy ? draftOf(policy.items, this.#typed() ?? {}) : null;
  });
  protected readonly changes = computed(() => {
    const items = this.policy()?.items ?? [];
    return (this.draft()?.changed ?? []).map((number) => ({
      ...number,
      from: policyNumber(items.find(({ key }) => key === number.key)?.value ?? NaN, number),
      to: policyNumber(this.draft()?.values[number.key] ?? NaN, number),
    }));
  });
  protected readonly changesRanges = computed(() =>
    (this.draft()?.changed ?? []).some(({ key }) => decidesRanges(key)),
  );
  protected readonly chapters = computed(() => {
    const items = this.policy()?.items ?? [];
    return [...new Set(items.map(({ subject }) => subject))].map((title) => ({
      title,
      items: items
        .filter(({ subject }) => subject === title)
        .map((item) => ({ ...item, fraction: isFraction(item) })),
    }));
  });

  readonly #seen = signal<{ readonly of: PolicyDraft; readonly preview: PolicyPreview } | null>(
    null,
  );
  /** What was seen counts only while nothing is typed after it. */
  protected readonly preview = computed(() => {
    const seen = this.#seen();
    return seen && seen.of === this.draft() ? seen.preview : null;
  });
  protected readonly reason = new FormControl('', {
    nonNullable: true,
    validators: zodValidator(policyPublishRequestSchema.shape.reason),
  });
  protected readonly publishing = new FormGroup({ reason: this.reason });
  protected readonly busy = signal(false);
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(() => this.#refused() ?? failureOf(this.read));
  protected readonly number = policyNumber;

  protected faultOf(key: string): string | null {
    return this.draft()?.faults.find((fault) => fault.key === key)?.message ?? null;
  }

  protected async look(policy: PolicyInForce): Promise<void> {
    const draft = this.#readyDraft();
    if (!draft) return;
    const request = { basedOn: policy.version, values: { ...draft.values }, offset: 0 };
    const preview = await this.#try(firstValueFrom(this.#client.previewPolicy(request)));
    if (preview) this.#seen.set({ of: draft, preview });
  }

  protected async more(policy: PolicyInForce): Promise<void> {
    const seen = this.#seen();
    if (!seen) return;
    const { items } = seen.preview;
    const request = {
      basedOn: policy.version,
      values: { ...seen.of.values },
      offset: items.length,
    };
    const next = await this.#try(firstValueFrom(this.#client.previewPolicy(request)));
    if (!next) return;
    this.#seen.set({ of: seen.of, preview: { ...next, items: [...items, ...next.items] } });
  }

  protected async publish(policy: PolicyInForce): Promise<void> {
    this.reason.markAsTouched();
    const draft = this.#readyDraft();
    if (!draft || this.preview() === null || this.reason.invalid) return;
    const request = {
      basedOn: policy.version,
      values: { ...draft.values },
      reason: this.reason.value,
    };
    const done = await this.#try(firstValueFrom(this.#client.publishPolicy(request)));
    if (!done) return;
    void this.#notices.say(`Version ${done.version} is in force.`);
    await this.#router.navigateByUrl('/settings/policy');
  }

  protected readAgain(): void {
    this.#refused.set(null);
    this.read.reload();
  }

  /** The draft when it has changes and no faults; else the faults are shown. */
  #readyDraft(): PolicyDraft | null {
    const [controls, draft] = [this.controls(), this.draft()];
    controls?.markAllAsTouched();
    if (!controls || !draft || controls.invalid) return null;
    return draft.changed.length > 0 && draft.faults.length === 0 ? draft : null;
  }

  async #try<T>(call: Promise<T>): Promise<T | undefined> {
    this.busy.set(true);
    this.#refused.set(null);
    try {
      return await call;
    } catch (error) {
      this.#refused.set(toProblem(error));
      return undefined;
    } finally {
      this.busy.set(false);
    }
  }
}

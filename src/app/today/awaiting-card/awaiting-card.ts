import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { physicianCauseWords } from '@shared/clinical/plan-limits';
import { reasonWords } from '@shared/clinical/prescribing/can-lead';
import { withdrawalWords } from '@shared/clinical/withdrawal';
import type { AwaitingItem } from '@shared/contracts/prescriptions-waiting-contract';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { Cautions } from '../../ui/cautions/cautions';
import { LoadLine } from '../../ui/load-line/load-line';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { StateChip } from '../../ui/state-chip/state-chip';
import { diagnosisWords, riskWords } from '../../ui/words/clinical-words';
import { formatDay, formatLocalDate, formatTime } from '../../ui/words/dates';
import {
  ceilingReason,
  maximumWords,
  methodWords,
  percentRange,
  rangeText,
} from '../../ui/words/prescription-words';
import { ceilingWords, rangeWords } from '../../ui/words/range-words';
import { TodayClient } from '../today-client';

const listed = (words: readonly string[]): string => words.join('; ');

/** A range that waits for a physician: read at a glance, signed in two presses, then the next. */
@Component({
  selector: 'app-awaiting-card',
  imports: [Cautions, LoadLine, MatButton, ProblemMessage, RouterLink, StateChip],
  templateUrl: './awaiting-card.html',
  styleUrl: './awaiting-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AwaitingCard {
  readonly item = input.required<AwaitingItem>();
  /** Signed: the focus goes on to the next. */
  readonly signed = output();

  readonly #client = inject(TodayClient);
  readonly #element = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  readonly #injector = inject(Injector);

  protected readonly asking = signal(false);
  protected readonly busy = signal(false);
  protected readonly signedAt = signal<string | null>(null);
  protected readonly problem = signal<Problem | null>(null);

  readonly #zone = computed(() => this.item().patient.site.timeZone);
  protected readonly who = computed(() => {
    const { patient, course, risk } = this.item();
    return [
      `${patient.ageYears}`,
      `born ${formatLocalDate(patient.birthDate)}`,
      patient.recordNumber,
      `${course.attended} of ${course.planned} sessions`,
      `${diagnosisWords[course.diagnosis]}, ${formatLocalDate(course.eventOn)}`,
      riskWords[risk],
    ].join(' · ');
  });
  protected readonly lead = computed(() => {
    const { target, perceivedExertion } = this.item().result;
    return target
      ? { value: rangeText(target), unit: 'bpm' }
      : { value: rangeText(perceivedExertion), unit: 'RPE, effort leads' };
  });
  protected readonly ceiling = computed(() => {
    const { result } = this.item();
    const reason = ceilingReason(result);
    return result.ceiling && { value: result.ceiling.value, reason };
  });
  protected readonly basis = computed(() => {
    const { method, maximum, intensity, perceivedExertion, reasons, guide } = this.item().result;
    if (method === 'perceived-exertion') {
      const why = listed(reasons.map((reason) => reasonWords[reason]));
      return `Effort leads: ${why}.${guide ? ` ${rangeText(guide)} bpm as a guide.` : ''}`;
    }
    const on = maximum ? ` on ${maximumWords[maximum.method]} ${maximum.value}` : '';
    const at = method === 'heart-rate-reserve' ? `, ${percentRange(intensity)}` : '';
    return `${methodWords[method]}${on}${at}. Effort ${rangeText(perceivedExertion)}.`;
  });
  protected readonly others = computed(() => {
    const { pressureCeiling, oxygenFloor } = this.item().result;
    return [
      pressureCeiling &&
        `Blood pressure at most ${pressureCeiling.systolic}/${pressureCeiling.diastolic} mmHg`,
      oxygenFloor !== null && `Oxygen saturation at least ${oxygenFloor} %`,
    ].filter((one) => typeof one === 'string');
  });
  protected readonly cautions = computed(() =>
    this.item().result.cautions.filter(({ severity }) => severity !== 'note'),
  );
  protected readonly causes = computed(() =>
    listed(this.item().causes.map((cause) => physicianCauseWords[cause])),
  );
  protected readonly outdated = computed(() =>
    listed(this.item().outdated.map((reason) => withdrawalWords[reason])),
  );
  protected readonly prepared = computed(() => {
    const { signedBy, signedAt } = this.item();
    return `${signedBy.displayName}, ${formatDay(signedAt, this.#zone())}, ${formatTime(signedAt, this.#zone())}`;
  });
  protected readonly inForce = computed(() => {
    const { inForce } = this.item();
    return inForce && `${rangeWords(inForce)}, ${ceilingWords(inForce)}`;
  });

  /** Takes the focus to what is to be pressed next. */
  focus(): void {
    this.#focusOn('.act .main');
  }

  protected ask(): void {
    this.asking.set(true);
    this.#focusOn('.act .main');
  }

  protected back(): void {
    this.asking.set(false);
    this.#focusOn('.act .main');
  }

  protected async sign(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { physicianSignedAt } = await firstValueFrom(this.#client.sign(this.item()));
      this.signedAt.set(formatTime(physicianSignedAt ?? '', this.#zone()));
      this.signed.emit();
    } catch (error) {
      this.problem.set(toProblem(error));
      this.asking.set(false);
    } finally {
      this.busy.set(false);
    }
  }

  #focusOn(selector: string): void {
    afterNextRender(() => this.#element.querySelector<HTMLElement>(selector)?.focus(), {
      injector: this.#injector,
    });
  }
}

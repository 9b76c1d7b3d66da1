import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Candidate, PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import { StateChip } from '../../ui/state-chip/state-chip';
import { maximumWords, methodWords, rangeText } from '../../ui/words/prescription-words';

/** A way to set the range as it stands here. */
export interface Way extends Pick<Candidate, 'method' | 'maximum'> {
  readonly name: string;
  readonly maximumText: string;
  readonly range: string | null;
  /** What is left under the ceiling, where that is less. */
  readonly under: string | null;
  readonly applicable: boolean;
  readonly why: string;
  readonly taken: boolean;
}

function maximumText({ maximum, maximumValue, standardError }: Candidate): string {
  if (maximum === null) return '–';
  const error = standardError === null ? '' : ` ± ${standardError}`;
  return maximumValue === null
    ? maximumWords[maximum]
    : `${Math.round(maximumValue)}${error} ${maximumWords[maximum]}`;
}

function wayOf(candidate: Candidate, answer: PrescriptionAnswer): Way {
  const { method, maximum, lower, upper, applicable, why } = candidate;
  const range = lower === null || upper === null ? null : { lower, upper };
  const top = answer.ceiling?.value ?? Infinity;
  const cut = range !== null && range.upper > top;
  return {
    method,
    maximum,
    name: methodWords[method],
    maximumText: maximumText(candidate),
    range: range && rangeText(range),
    under: !cut ? null : range.lower < top ? rangeText({ ...range, upper: top }) : 'nothing left',
    applicable,
    why,
    taken: method === answer.method && maximum === (answer.maximum?.method ?? null),
  };
}

/** Every way to set the range, side by side, with why it can be used or not; one is taken. */
@Component({
  selector: 'app-ways-table',
  imports: [MatButton, StateChip],
  templateUrl: './ways-table.html',
  styleUrl: './ways-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WaysTable {
  readonly answer = input.required<PrescriptionAnswer>();
  readonly choosable = input(false);
  /** Whether the way taken was chosen by a person rather than proposed by the rules. */
  readonly chosen = input(false);
  readonly choose = output<Pick<Candidate, 'method' | 'maximum'> | null>();

  protected readonly ways = computed(() =>
    this.answer().candidates.map((candidate) => wayOf(candidate, this.answer())),
  );
}

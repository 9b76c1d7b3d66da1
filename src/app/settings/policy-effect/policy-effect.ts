import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { EffectPart } from '@shared/clinical/program-policy';
import { withdrawalWords } from '@shared/clinical/withdrawal';
import type {
  ChangedRange,
  PolicyPreview,
  RangeInBrief,
} from '@shared/contracts/policy-change-contract';
import { areas, mayOpen } from '../../core/navigation';
import { Session } from '../../core/session';

const partWords: Readonly<Record<EffectPart, string>> = {
  range: 'range',
  ceiling: 'ceiling',
  effort: 'effort',
  'ask-line': 'ask line',
  work: 'workloads',
  limits: 'pressure or oxygen limit',
};

function rangeWords({ target, guide, perceivedExertion }: RangeInBrief): string {
  if (target) return `${target.lower}–${target.upper} bpm`;
  const { lower, upper } = perceivedExertion;
  const effort = `effort ${lower}–${upper}`;
  return guide ? `${effort}, guide ${guide.lower}–${guide.upper} bpm` : effort;
}

const ceilingWords = ({ ceiling }: RangeInBrief): string =>
  ceiling === null ? 'none' : `${ceiling} bpm`;

function rowOf(item: ChangedRange) {
  const { before, after } = item;
  return {
    ...item,
    range: [rangeWords(before), after ? rangeWords(after) : null] as const,
    ceiling: [ceilingWords(before), after ? ceilingWords(after) : null] as const,
    what: item.parts.map((part) => partWords[part]).join(', '),
    whyWithdrawn: item.withdrawn.map((reason) => withdrawalWords[reason]).join(', '),
  };
}

/** What a proposed policy would make of the ranges in force: how many, whose, from what to what. */
@Component({
  selector: 'app-policy-effect',
  imports: [RouterLink],
  templateUrl: './policy-effect.html',
  styleUrl: './policy-effect.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PolicyEffect {
  readonly preview = input.required<PolicyPreview>();
  readonly #session = inject(Session);

  protected readonly opensPatients = computed(() => {
    const patients = areas.find(({ path }) => path === 'patients');
    return patients !== undefined && mayOpen(patients, this.#session.roles());
  });
  protected readonly parts = computed(() =>
    Object.entries(this.preview().byPart).map(
      ([part, count]) => `${partWords[part as EffectPart]} ${count}`,
    ),
  );
  protected readonly rows = computed(() => this.preview().items.map(rowOf));
}

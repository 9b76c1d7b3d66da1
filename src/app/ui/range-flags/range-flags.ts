import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { type RangeFlag, factWords } from '@shared/clinical/range-flags';
import type { FactEffect } from '@shared/clinical/prescribing/effect-of-fact';
import { StateChip, type Tone } from '../state-chip/state-chip';
import { formatDay, formatTime } from '../words/dates';

const effectWords: Readonly<Record<FactEffect['effect'], { words: string; tone: Tone }>> = {
  withdrawn: { words: 'Withdrawn', tone: 'over' },
  stop: { words: 'Stop', tone: 'over' },
  'effort-today': { words: 'Effort leads today', tone: 'due' },
  'review-due': { words: 'Review due', tone: 'due' },
};

/** What touches the range in force: each cause once, with its reason, by whom and when. */
@Component({
  selector: 'app-range-flags',
  imports: [StateChip],
  template: `
    @if (rows().length > 0) {
      <ul aria-label="What touches the range in force">
        @for (row of rows(); track row.key) {
          <li>
            <app-state-chip [tone]="row.tone">{{ row.words }}</app-state-chip>
            <span
              ><b>{{ row.fact }}</b
              >{{ row.detail }} <span class="muted num">{{ row.who }}</span></span
            >
          </li>
        }
      </ul>
      @if (consequence(); as line) {
        <p class="muted">{{ line }}</p>
      }
    }
  `,
  styles: `
    :host {
      display: block;
    }
    :host:empty {
      display: none;
    }
    ul {
      margin: 0;
      padding: 0;
      list-style: none;
      display: grid;
      gap: 0.35rem;
    }
    li {
      display: flex;
      flex-wrap: wrap;
      align-items: baseline;
      gap: 0.25rem 0.5rem;
    }
    p {
      margin: 0.35rem 0 0;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RangeFlags {
  readonly flags = input.required<readonly RangeFlag[]>();
  readonly timeZone = input.required<string>();

  protected readonly rows = computed(() =>
    this.flags().map(({ fact, effect, detail, at, by }) => ({
      ...effectWords[effect],
      key: `${fact} ${at}`,
      fact: factWords[fact],
      detail: detail === null ? '' : `: ${detail}`,
      who: [by, `${formatDay(at, this.timeZone())}, ${formatTime(at, this.timeZone())}`]
        .filter((part) => part !== null)
        .join(', '),
    })),
  );
  protected readonly consequence = computed(() => {
    const effects = this.flags().map(({ effect }) => effect);
    if (effects.includes('withdrawn')) {
      return 'Effort leads and the ceiling stays until a new range is signed.';
    }
    if (effects.includes('effort-today'))
      return 'The range leads again tomorrow. The ceiling stays.';
    return effects.includes('review-due') ? 'The range stays in force until it is reviewed.' : null;
  });
}

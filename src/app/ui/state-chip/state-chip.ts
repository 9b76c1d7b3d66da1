import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { Icon } from '../icon/icon';
import type { IconName } from '../icon/icon-names';

export type Tone = 'in' | 'over' | 'due' | 'plain';

const signs: Record<Tone, IconName | null> = {
  in: 'check',
  over: 'priority-high',
  due: 'schedule',
  plain: null,
};

/** A state in words, its content, with a sign and a ground: lagoon in range, oxide over, rope for attention. */
@Component({
  selector: 'app-state-chip',
  imports: [Icon],
  template: `
    @if (sign(); as name) {
      <app-icon [name]="name" />
    }
    <span><ng-content /></span>
  `,
  styleUrl: './state-chip.scss',
  host: { '[class]': 'tone()' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StateChip {
  readonly tone = input<Tone>('plain');
  /** Another sign than the tone's own. */
  readonly icon = input<IconName | null>(null);
  protected readonly sign = computed(() => this.icon() ?? signs[this.tone()]);
}

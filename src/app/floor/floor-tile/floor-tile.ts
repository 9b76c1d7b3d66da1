import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Icon } from '../../ui/icon/icon';
import { LoadLine } from '../../ui/load-line/load-line';
import type { LoadLineFacts } from '../../ui/load-line/load-line-facts';
import { StateChip } from '../../ui/state-chip/state-chip';
import { ceilingReason } from '../visit/floor-words';
import { tileOf } from '../visit/tile-view';
import type { Visit } from '../visit/visit';

/** One patient of the class: name, last rate and when it was read, its place, and what stands out. A press opens the visit. */
@Component({
  selector: 'app-floor-tile',
  imports: [Icon, LoadLine, StateChip],
  templateUrl: './floor-tile.html',
  styleUrl: './floor-tile.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FloorTile {
  readonly visit = input.required<Visit>();
  readonly now = input.required<Date>();
  readonly timeZone = input.required<string>();
  readonly selected = input(false);
  readonly opened = output();

  protected readonly tile = computed(() => tileOf(this.visit(), this.now(), this.timeZone()));
  protected readonly ceiling = computed<LoadLineFacts['ceiling']>(() => {
    const { ceiling } = this.visit();
    return ceiling && { value: ceiling.value, reason: ceilingReason(ceiling) };
  });
  protected readonly marker = computed<LoadLineFacts['marker']>(() => {
    const { rate } = this.tile();
    return rate === null ? null : { value: rate, label: 'Last rate' };
  });
}

import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { describeLoadLine } from './describe-load-line';
import type { LoadLineFacts, LoadLineSize, RateScale } from './load-line-facts';
import { drawTile } from './tile-drawing';
import { drawUpright, labelX, leastScale, uprightSizes } from './upright-drawing';

let drawn = 0;

/**
 * A prescription as a ship's load line: the range as a band, the ceiling as a heavy line with its reason and the
 * forbidden part hatched above it. Upright in the worksheet and for the patient, lying down in a tile of the floor.
 */
@Component({
  selector: 'app-load-line',
  templateUrl: './load-line.html',
  styleUrl: './load-line.scss',
  host: { '[class]': 'size()' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LoadLine {
  readonly size = input.required<LoadLineSize>();
  readonly target = input.required<LoadLineFacts['target']>();
  readonly ceiling = input.required<LoadLineFacts['ceiling']>();
  readonly resting = input<LoadLineFacts['resting']>(null);
  readonly guide = input<LoadLineFacts['guide']>(null);
  readonly askLine = input<LoadLineFacts['askLine']>(null);
  readonly ticks = input<LoadLineFacts['ticks']>([]);
  readonly marker = input<LoadLineFacts['marker']>(null);
  /** What an upright scale shows in any case: beside another load line, what both need. */
  readonly scale = input<RateScale>(leastScale);

  // A pattern is found by its id, so each load line of a page needs its own.
  protected readonly hatching = `load-line-hatching-${(drawn += 1)}`;
  protected readonly hatchFill = `url(#${this.hatching})`;

  readonly #facts = computed<LoadLineFacts>(() => ({
    resting: this.resting(),
    target: this.target(),
    guide: this.guide(),
    ceiling: this.ceiling(),
    askLine: this.askLine(),
    ticks: this.ticks(),
    marker: this.marker(),
  }));
  protected readonly words = computed(() => describeLoadLine(this.#facts(), this.size()));
  protected readonly tile = computed(() =>
    this.size() === 'tile' ? drawTile(this.#facts()) : null,
  );
  protected readonly upright = computed(() => {
    const size = this.size();
    return size === 'tile' ? null : drawUpright(this.#facts(), uprightSizes[size], this.scale());
  });
  protected readonly labelX = labelX;
}

import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { AttendedSession } from '@shared/contracts/my-progress-contract';
import { dateInWords } from '../../ui/site-time/site-time';
import { HEIGHT, WIDTH, drawRates } from './rate-drawing';

/** A dot a session on a scale of heart rates, with the range of each day behind. The page's table says the same in words. */
@Component({
  selector: 'app-rate-picture',
  templateUrl: './rate-picture.html',
  styleUrl: './rate-picture.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RatePicture {
  /** In order, one with a rate at least. */
  readonly sessions = input.required<readonly AttendedSession[]>();
  /** What a reader hears in its place. */
  readonly description = input.required<string>();

  protected readonly box = `0 0 ${WIDTH} ${HEIGHT}`;
  protected readonly drawing = computed(() => drawRates(this.sessions()));
  protected readonly first = computed(() => this.#day(0));
  protected readonly last = computed(() => (this.sessions().length > 1 ? this.#day(-1) : null));

  #day(index: number): string {
    const session = this.sessions().at(index);
    return session ? dateInWords(session.localDate, 'short').replace(/^\w+, /, '') : '';
  }
}

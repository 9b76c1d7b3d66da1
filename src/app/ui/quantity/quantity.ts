import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** A number with its unit set small after it; a dash and the words of `missing` where there is none. */
@Component({
  selector: 'app-quantity',
  template: `
    @if (value() === null) {
      <span aria-hidden="true">–</span><span class="visually-hidden">{{ missing() }}</span>
    } @else {
      {{ value() }}<small>{{ unit() }}</small>
    }
  `,
  styleUrl: './quantity.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Quantity {
  /** A number, or one written out already, such as a range or a pressure. */
  readonly value = input.required<number | string | null>();
  readonly unit = input('');
  /** Read out where there is no number. */
  readonly missing = input('not recorded');
}

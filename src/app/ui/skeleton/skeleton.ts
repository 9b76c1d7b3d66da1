import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

/** The place of what is still loading, in lines of text's height; says "Loading" to a screen reader. */
@Component({
  selector: 'app-skeleton',
  template: `
    <span class="visually-hidden" role="status">Loading</span>
    @for (line of rows(); track line) {
      <span class="line"></span>
    }
  `,
  styleUrl: './skeleton.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Skeleton {
  readonly lines = input(3);
  protected readonly rows = computed(() => Array.from({ length: this.lines() }, (_, row) => row));
}

import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { type IconName, icons } from './icon-names';

/** A sign from the icon font. It is never read out: the word beside it, or the control's label, is. */
@Component({
  selector: 'app-icon',
  template: '{{ character() }}',
  styleUrl: './icon.scss',
  host: { 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Icon {
  readonly name = input.required<IconName>();
  protected readonly character = computed(() => icons[this.name()]);
}

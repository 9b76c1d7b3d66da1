import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { Icon } from '../icon/icon';
import type { IconName } from '../icon/icon-names';

/** Says that there is nothing, and in its content what to do next. */
@Component({
  selector: 'app-empty-state',
  imports: [Icon],
  template: `
    <app-icon [name]="icon()" />
    <p class="heading">{{ heading() }}</p>
    <div><ng-content /></div>
  `,
  styleUrl: './empty-state.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EmptyState {
  readonly heading = input.required<string>();
  readonly icon = input<IconName>('info');
}

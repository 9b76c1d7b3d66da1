import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { StateChip } from '../../ui/state-chip/state-chip';
import type { Line } from '../entry-editor/entry-form';

/** Values made from an entry: each with what a cut-off says of it and where it comes from. */
@Component({
  selector: 'app-computed-lines',
  imports: [StateChip],
  template: `
    <dl>
      @for (line of lines(); track line.label) {
        <div>
          <dt>{{ line.label }}</dt>
          <dd>
            <span class="value num">{{ line.value ?? '–' }}</span>
            @if (line.judgment) {
              <app-state-chip [tone]="line.isDue ? 'due' : 'plain'">{{
                line.judgment
              }}</app-state-chip>
            }
            @if (line.why) {
              <span class="why">{{ line.why }}</span>
            }
            @if (line.source) {
              <span class="source">{{ line.source }}</span>
            }
          </dd>
        </div>
      }
    </dl>
  `,
  styleUrl: './computed-lines.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ComputedLines {
  readonly lines = input.required<readonly Line[]>();
}

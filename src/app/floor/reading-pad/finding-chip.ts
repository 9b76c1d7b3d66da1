import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { StateChip } from '../../ui/state-chip/state-chip';
import type { Finding } from './findings';

/** What a typed value means, in a word beside it, read out as it changes. */
@Component({
  selector: 'app-finding-chip',
  imports: [StateChip],
  template: `
    @if (finding(); as found) {
      <app-state-chip [tone]="found.tone" [icon]="found.icon">{{ found.text }}</app-state-chip>
    }
  `,
  host: { 'aria-live': 'polite' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FindingChip {
  readonly finding = input<Finding | null>();
}

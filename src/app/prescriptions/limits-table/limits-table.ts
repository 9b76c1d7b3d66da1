import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing/answer';
import { StateChip } from '../../ui/state-chip/state-chip';
import { limitReason } from '../../ui/words/prescription-words';

/** Every limit below which the ceiling stays, with its rule and where the rule comes from. */
@Component({
  selector: 'app-limits-table',
  imports: [StateChip],
  template: `
    @if (rows().length === 0) {
      <p class="muted">
        Nothing is known that limits the rate: no threshold, no defibrillator zone, no tracking
        rate.
      </p>
    } @else {
      <div class="scroll-x" tabindex="0" role="region" aria-label="Table of limits">
        <table class="data">
          <thead>
            <tr>
              <th scope="col">Limit</th>
              <th scope="col" class="number">bpm</th>
              <th scope="col">Rule</th>
              <th scope="col">Source</th>
            </tr>
          </thead>
          <tbody>
            @for (row of rows(); track $index) {
              <tr>
                <th scope="row">
                  {{ row.reason }}
                  @if (row.binds) {
                    <app-state-chip tone="over">sets the ceiling</app-state-chip>
                  }
                </th>
                <td class="number">{{ row.value }}</td>
                <td>{{ row.rule }}</td>
                <td>{{ row.source }}</td>
              </tr>
            }
          </tbody>
        </table>
      </div>
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LimitsTable {
  readonly answer = input.required<PrescriptionAnswer>();
  protected readonly rows = computed(() => {
    const { limits, ceiling } = this.answer();
    return limits.map((limit) => ({
      ...limit,
      reason: limitReason(limit),
      binds: limit.value === ceiling?.value,
    }));
  });
}

import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { StateChip } from '../../ui/state-chip/state-chip';
import type { DifferenceGroup } from './difference';

/** Facts of two versions beside each other; what changed says so in words. */
@Component({
  selector: 'app-difference-table',
  imports: [StateChip],
  template: `
    @if (shown().length === 0) {
      <p class="muted">{{ nothing() }}</p>
    } @else {
      <div class="scroll-x" tabindex="0" role="region" [attr.aria-label]="'Table: ' + label()">
        <table class="data" [attr.aria-label]="label()">
          <thead>
            <tr>
              <th scope="col">What</th>
              <th scope="col">{{ columns()[0] }}</th>
              <th scope="col">{{ columns()[1] }}</th>
              <th scope="col">Change</th>
            </tr>
          </thead>
          @for (group of shown(); track group.heading) {
            <tbody>
              @if (group.heading) {
                <tr class="group">
                  <th scope="rowgroup" colspan="4">{{ group.heading }}</th>
                </tr>
              }
              @for (row of group.rows; track $index) {
                <tr [class.changed]="row.change !== null">
                  <th scope="row">{{ row.label }}</th>
                  <td>{{ row.before ?? 'none' }}</td>
                  <td>{{ row.after ?? 'none' }}</td>
                  <td>
                    @if (row.change; as words) {
                      <app-state-chip tone="due" icon="edit">{{ words }}</app-state-chip>
                    } @else {
                      <span class="muted">same</span>
                    }
                  </td>
                </tr>
              }
            </tbody>
          }
        </table>
      </div>
    }
  `,
  styleUrl: './difference-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DifferenceTable {
  readonly label = input.required<string>();
  readonly groups = input.required<readonly DifferenceGroup[]>();
  readonly columns = input<readonly [string, string]>(['Earlier', 'Later']);
  /** Leaves out what is the same. */
  readonly changedOnly = input(false);
  /** What is said where no row is left. */
  readonly nothing = input('Nothing differs.');

  protected readonly shown = computed(() =>
    this.groups()
      .map(({ heading, rows }) => ({
        heading,
        rows: this.changedOnly() ? rows.filter(({ change }) => change !== null) : rows,
      }))
      .filter(({ rows }) => rows.length > 0),
  );
}

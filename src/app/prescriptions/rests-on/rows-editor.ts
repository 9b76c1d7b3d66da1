import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { FormArray, FormGroup } from '@angular/forms';
import { MatButton, MatIconButton } from '@angular/material/button';
import { Icon } from '../../ui/icon/icon';
import { InputField } from '../input-field/input-field';
import { WorksheetState } from '../worksheet/worksheet-state';
import type { FieldSpec } from './field-specs';

/** Rows of the same fields, as thresholds and zones of a defibrillator, with a way to add and remove one. */
@Component({
  selector: 'app-rows-editor',
  imports: [Icon, InputField, MatButton, MatIconButton],
  template: `
    @for (group of groups(); track group; let index = $index) {
      <div class="entry" role="group" [attr.aria-label]="name() + ' ' + (index + 1)">
        @for (spec of fields(); track spec.path) {
          <app-input-field [spec]="spec" [group]="group" />
        }
        <button
          matIconButton
          type="button"
          [attr.aria-label]="'Remove ' + name() + ' ' + (index + 1)"
          (click)="rows().removeAt(index)"
        >
          <app-icon name="delete" />
        </button>
      </div>
    }
    <button matButton="outlined" type="button" (click)="add()()">
      <app-icon name="add" /> Add a {{ name() }}
    </button>
  `,
  styleUrl: './rows-editor.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RowsEditor {
  readonly #state = inject(WorksheetState);
  readonly rows = input.required<FormArray<FormGroup>>();
  readonly fields = input.required<readonly FieldSpec[]>();
  readonly name = input.required<string>();
  readonly add = input.required<() => void>();

  /** Read anew at each change of the form. */
  protected readonly groups = computed(() => {
    this.#state.value();
    return [...this.rows().controls];
  });
}

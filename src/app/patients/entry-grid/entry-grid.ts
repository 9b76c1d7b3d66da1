import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  inject,
  input,
  output,
} from '@angular/core';
import { type FormArray, type FormGroup, ReactiveFormsModule } from '@angular/forms';
import { FieldError } from '../../ui/field-error/field-error';
import { Icon } from '../../ui/icon/icon';
import type { EntryField } from '../entry-editor/entry-form';

/** Rows as a table: Tab runs along a row, Enter and the arrows up and down along a column. */
@Component({
  selector: 'app-entry-grid',
  imports: [FieldError, Icon, ReactiveFormsModule],
  templateUrl: './entry-grid.html',
  styleUrl: './entry-grid.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntryGrid {
  readonly #element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly label = input.required<string>();
  readonly fields = input.required<readonly EntryField[]>();
  readonly rows = input.required<FormArray<FormGroup>>();
  readonly removed = output<number>();

  protected unitOf(field: EntryField): string {
    return field.type === 'number' ? field.units[0].name : '';
  }

  protected move(event: Event, row: number, column: number, by: 1 | -1): void {
    event.preventDefault();
    this.#element.nativeElement
      .querySelector<HTMLInputElement>(`[data-cell="${row + by}-${column}"]`)
      ?.focus();
  }
}

import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { AbstractControl } from '@angular/forms';
import { map, startWith, switchMap } from 'rxjs';
import { fieldErrorOf } from './zod-validator';

/** The words of a control's error, for `<mat-error>`. */
@Component({
  selector: 'app-field-error',
  template: '{{ message() }}',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FieldError {
  readonly control = input.required<AbstractControl>();
  protected readonly message = toSignal(
    toObservable(this.control).pipe(
      switchMap((control) =>
        control.events.pipe(
          startWith(null),
          map(() => fieldErrorOf(control)),
        ),
      ),
    ),
  );
}

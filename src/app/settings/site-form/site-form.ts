import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { MatAutocomplete, MatAutocompleteTrigger, MatOption } from '@angular/material/autocomplete';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { startWith, switchMap } from 'rxjs';
import { FieldError } from '../../ui/field-error/field-error';
import { matchingZones, timeIn } from '../time-zones';
import type { SiteControls } from './site-controls';

const zones = Intl.supportedValuesOf('timeZone');

/** The fields of a site; its zone decides when its classes are. */
@Component({
  selector: 'app-site-form',
  imports: [
    FieldError,
    MatAutocomplete,
    MatAutocompleteTrigger,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    MatOption,
    ReactiveFormsModule,
  ],
  templateUrl: './site-form.html',
  styleUrl: './site-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SiteForm {
  readonly controls = input.required<SiteControls>();

  readonly #zone = toSignal(
    toObservable(this.controls).pipe(
      switchMap(({ controls: { timeZone } }) =>
        timeZone.valueChanges.pipe(startWith(timeZone.value)),
      ),
    ),
    { initialValue: '' },
  );
  /** All of them again once one is chosen. */
  protected readonly zones = computed(() => {
    const typed = this.#zone();
    return matchingZones(zones, zones.includes(typed) ? '' : typed, zones.length);
  });
  protected readonly timeThere = computed(() => timeIn(this.#zone(), new Date()));
}

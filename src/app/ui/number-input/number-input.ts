import { Directive, ElementRef, effect, forwardRef, inject, input } from '@angular/core';
import { type ControlValueAccessor, NG_VALUE_ACCESSOR } from '@angular/forms';

const plain = /^[+-]?(\d+([.,]\d*)?|[.,]\d+)$/;

/** More digits than anybody types, fewer than a float makes up. */
const tidy = (value: number): number => Number(value.toPrecision(12));

/**
 * A text field that holds a number: null when empty, and what was typed as it stands when it is none, so that the
 * contract's rule can say what to enter. A dot and a comma both serve; no wheel and no arrow changes it by accident.
 */
@Directive({
  selector: 'input[appNumber]',
  host: {
    inputmode: 'decimal',
    autocomplete: 'off',
    '(input)': 'typed($event)',
    '(blur)': 'left()',
    '[disabled]': 'disabled',
  },
  providers: [
    { provide: NG_VALUE_ACCESSOR, useExisting: forwardRef(() => NumberInput), multi: true },
  ],
})
export class NumberInput implements ControlValueAccessor {
  /** How often the shown unit goes into the kept one: 100 shows a fraction in percent. */
  readonly factor = input(1);
  protected disabled = false;

  readonly #element = inject<ElementRef<HTMLInputElement>>(ElementRef).nativeElement;
  #written: number | string | null = null;
  #changed: (value: number | string | null) => void = () => undefined;
  #touched: () => void = () => undefined;

  constructor() {
    // A form may write before the factor is known.
    effect(() => {
      this.#show(this.factor());
    });
  }

  writeValue(value: number | string | null): void {
    this.#written = value;
    this.#show(this.factor());
  }

  registerOnChange(changed: (value: number | string | null) => void): void {
    this.#changed = changed;
  }

  registerOnTouched(touched: () => void): void {
    this.#touched = touched;
  }

  setDisabledState(disabled: boolean): void {
    this.disabled = disabled;
  }

  #show(factor: number): void {
    const value = this.#written;
    this.#element.value = typeof value === 'number' ? String(tidy(value * factor)) : (value ?? '');
  }

  protected typed(event: Event): void {
    const text = (event.target as HTMLInputElement).value.trim();
    if (text === '') this.#changed(null);
    else if (plain.test(text)) this.#changed(tidy(Number(text.replace(',', '.')) / this.factor()));
    else this.#changed(text);
  }

  protected left(): void {
    this.#touched();
  }
}

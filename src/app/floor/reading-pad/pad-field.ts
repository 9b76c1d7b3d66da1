import type { ElementRef } from '@angular/core';
import { ChangeDetectionStrategy, Component, input, output, viewChild } from '@angular/core';
import type { VitalSign } from '@shared/clinical/vital-sign-bounds';
import { digitsIn } from '../reading-draft';
import { signWords } from '../visit/floor-words';

let fields = 0;

/** The box of one value. It opens no keyboard on a tablet, since the number pad is there; a real keyboard types into it. */
@Component({
  selector: 'app-pad-field',
  template: `
    <label [attr.for]="id" [class.visually-hidden]="labelHidden()">
      {{ words[field()] }}
      @if (before(); as value) {
        <small>before {{ value }}</small>
      }
    </label>
    <ng-content />
    <span class="box">
      <input
        #box
        type="text"
        inputmode="none"
        autocomplete="off"
        enterkeyhint="next"
        [id]="id"
        [attr.aria-invalid]="fault() !== undefined"
        [attr.aria-describedby]="id + '-fault'"
        [value]="digits()"
        (focus)="activated.emit()"
        (input)="type()"
        (keydown.enter)="enter($event)"
      />
      @if (unit(); as shown) {
        <small>{{ shown }}</small>
      }
    </span>
    <span class="fault" [id]="id + '-fault'">{{ fault() }}</span>
  `,
  styleUrl: './pad-field.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PadField {
  readonly field = input.required<VitalSign>();
  readonly digits = input.required<string>();
  readonly fault = input<string>();
  readonly unit = input('');
  /** What this visit's last reading of it was. */
  readonly before = input<number | null>(null);
  readonly labelHidden = input(false);
  readonly typed = output<string>();
  readonly activated = output();
  readonly entered = output();

  protected readonly id = `pad-field-${(fields += 1)}`;
  protected readonly words = signWords;
  private readonly box = viewChild.required<ElementRef<HTMLInputElement>>('box');

  focus(): void {
    this.box().nativeElement.focus();
  }

  protected type(): void {
    const box = this.box().nativeElement;
    // What is refused must not stay in the box, and Angular would not see that it does.
    box.value = digitsIn(this.field(), box.value);
    this.typed.emit(box.value);
  }

  protected enter(event: Event): void {
    event.preventDefault();
    this.entered.emit();
  }
}

import { ChangeDetectionStrategy, Component, input, type Signal } from '@angular/core';
import { MatButton } from '@angular/material/button';

interface ReadByPage {
  readonly nextCursor: Signal<string | null>;
  readonly loading: Signal<boolean>;
  readonly load: () => void;
}

/** Reads the next page of a list; not there where the list is at its end. */
@Component({
  selector: 'app-show-more',
  imports: [MatButton],
  template: `
    @if (list().nextCursor() !== null) {
      <button
        type="button"
        matButton="outlined"
        [disabled]="list().loading()"
        disabledInteractive
        (click)="list().load()"
      >
        {{ words() }}
      </button>
    }
  `,
  styles: `
    button {
      margin-top: 1rem;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShowMore {
  readonly list = input.required<ReadByPage>();
  readonly words = input('Show more');
}

import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** Plimsoll's mark: a hull cut at the waterline with draft marks. */
@Component({
  selector: 'app-mark',
  template: `<svg
    viewBox="0 0 40 40"
    [attr.width]="size()"
    [attr.height]="size()"
    aria-hidden="true"
    focusable="false"
  >
    <rect width="40" height="40" rx="9" fill="#F4EFE4" />
    <path d="M0 9a9 9 0 0 1 9-9h22a9 9 0 0 1 9 9v13H0z" fill="#33496F" />
    <path d="M0 25h40v6a9 9 0 0 1-9 9H9a9 9 0 0 1-9-9z" fill="#A8432F" />
    <path
      d="M27 7h6M27 12h4M27 17h6M27 30h4M27 35h6"
      stroke="#F4EFE4"
      stroke-width="2"
      stroke-linecap="round"
    />
  </svg>`,
  styles: ':host { display: inline-block; line-height: 0; }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Mark {
  /** Side in CSS pixels. */
  readonly size = input(40);
}

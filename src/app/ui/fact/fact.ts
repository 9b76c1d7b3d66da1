import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** A fact's name, its value as content, and below them where it comes from and of when: `<dl><div appFact label="…">`. */
@Component({
  selector: 'div[appFact]',
  template: `
    <dt>{{ label() }}</dt>
    <dd class="value"><ng-content /></dd>
    @if (source(); as text) {
      <dd class="source">{{ text }}</dd>
    }
  `,
  styleUrl: './fact.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Fact {
  readonly label = input.required<string>();
  readonly source = input<string | null>(null);
}

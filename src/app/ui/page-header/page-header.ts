import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** The head of a page: where one is, its heading, a line below, and the page's actions as content. */
@Component({
  selector: 'app-page-header',
  template: `
    <div class="words">
      @if (eyebrow(); as text) {
        <p class="eyebrow">{{ text }}</p>
      }
      <h1>{{ heading() }}</h1>
      @if (detail(); as text) {
        <p class="detail num">{{ text }}</p>
      }
    </div>
    <div class="actions"><ng-content /></div>
  `,
  styleUrl: './page-header.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PageHeader {
  readonly heading = input.required<string>();
  readonly eyebrow = input<string | null>(null);
  readonly detail = input<string | null>(null);
}

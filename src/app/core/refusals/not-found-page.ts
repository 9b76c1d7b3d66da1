import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { PageHeader } from '../../ui/page-header/page-header';

@Component({
  selector: 'app-not-found-page',
  imports: [PageHeader, RouterLink],
  template: `
    <app-page-header heading="There is no such page" />
    <p>The address may be mistyped, or the page has moved.</p>
    <p><a routerLink="/">Go to your first page</a></p>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFoundPage {}

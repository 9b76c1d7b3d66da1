import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { PageHeader } from '../../ui/page-header/page-header';

@Component({
  selector: 'app-not-allowed-page',
  imports: [PageHeader, RouterLink],
  template: `
    <app-page-header heading="Your account can’t open this page" />
    <p>If your work needs it, ask an administrator of your program to add the role.</p>
    <p><a routerLink="/">Go to your first page</a></p>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotAllowedPage {}

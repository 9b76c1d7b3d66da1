import { ChangeDetectionStrategy, Component, DestroyRef, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Undelivered } from '@shared/contracts/messages-contract';
import { areaOf, mayOpen } from '../../core/navigation';
import { PagedList } from '../../core/paged-list';
import { Session } from '../../core/session';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { BillingClient } from '../billing-client';

const kinds: Readonly<Record<Undelivered['kind'], string>> = {
  'booking-confirmation': 'Booking confirmed',
  'booking-cancellation': 'Booking cancelled',
  reminder: 'Reminder',
  receipt: 'Receipt',
  invitation: 'Invitation to an account',
  'password-reset': 'Link for a new password',
};

const reasons: Readonly<Record<Undelivered['reason'], string>> = {
  'no-address': 'The record holds no e-mail address.',
  'address-refused-before': 'The address refused an earlier message.',
  'address-refused': 'The address does not exist.',
  'message-refused': 'The mail server would not take it.',
  'not-reached': 'The mail server could not be reached for two days.',
};

/** Whom no message reached, so that the desk can call. */
@Component({
  selector: 'app-messages-page',
  imports: [EmptyState, MatButton, PageHeader, ProblemMessage, RouterLink, ShowMore, Skeleton],
  templateUrl: './messages-page.html',
  styleUrl: '../charges-page/charges-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MessagesPage {
  readonly #client = inject(BillingClient);

  protected readonly list = new PagedList<Undelivered>(
    (cursor) => this.#client.undelivered(cursor),
    inject(DestroyRef),
  );
  protected readonly mayOpenPatients = mayOpen(areaOf('patients'), inject(Session).roles());
  protected readonly kinds = kinds;
  protected readonly reasons = reasons;

  constructor() {
    this.list.load();
  }

  protected timeOf({ dueAt }: Undelivered): string {
    return new Intl.DateTimeFormat('en-US', { dateStyle: 'medium', timeStyle: 'short' }).format(
      new Date(dueAt),
    );
  }
}

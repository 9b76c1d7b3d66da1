import { ChangeDetectionStrategy, Component, DestroyRef, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatOption, MatSelect } from '@angular/material/select';
import { RouterLink } from '@angular/router';
import type { Charge } from '@shared/contracts/billing-contract';
import { firstValueFrom } from 'rxjs';
import { LEAVE } from '../../core/leave';
import { PagedList } from '../../core/paged-list';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { amountOf, classTime, dayOf, stateOf } from '../../ui/charge/charge-words';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { BillingClient } from '../billing-client';

/** Every charge of the reader's sites, what is owed first asked for. */
@Component({
  selector: 'app-charges-page',
  imports: [
    EmptyState,
    MatButton,
    MatFormField,
    MatLabel,
    MatOption,
    MatSelect,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './charges-page.html',
  styleUrl: './charges-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChargesPage {
  readonly #client = inject(BillingClient);
  readonly #leave = inject(LEAVE);

  protected readonly takesPayments = inject(Session).roles().includes('front-desk');
  protected readonly status = signal<Charge['status'] | null>('open');
  protected readonly list = new PagedList(
    (cursor) => this.#client.charges({ status: this.status(), cursor }),
    inject(DestroyRef),
  );
  protected readonly paying = signal<string | null>(null);
  protected readonly payProblem = signal<Problem | null>(null);
  protected readonly choices: readonly { value: Charge['status'] | null; words: string }[] = [
    { value: 'open', words: 'To pay' },
    { value: 'paid', words: 'Paid' },
    { value: 'refunded', words: 'Paid back' },
    { value: 'void', words: 'Taken back unpaid' },
    { value: null, words: 'All' },
  ];

  protected readonly amountOf = amountOf;
  protected readonly classTime = classTime;
  protected readonly dayOf = dayOf;
  protected readonly stateOf = stateOf;

  constructor() {
    this.list.load();
  }

  protected choose(status: Charge['status'] | null): void {
    this.status.set(status);
    this.list.restart();
  }

  protected async takePayment(charge: Charge): Promise<void> {
    if (this.paying() !== null) return;
    this.paying.set(charge.id);
    this.payProblem.set(null);
    try {
      this.#leave(await firstValueFrom(this.#client.checkOut(charge)));
    } catch (error) {
      this.payProblem.set(toProblem(error));
      this.paying.set(null);
    }
  }
}

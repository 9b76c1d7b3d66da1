import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Charge } from '@shared/contracts/billing-contract';
import { formatMoney } from '@shared/units/money';
import { firstValueFrom } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { amountOf, classTime, dayOf, stateOf } from '../../ui/charge/charge-words';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { LEAVE } from '../../core/leave';
import { MyPaymentsClient } from '../my-payments-client';

/** What a patient owes, and what they paid. */
@Component({
  selector: 'app-payments-page',
  imports: [EmptyState, MatButton, PageHeader, ProblemMessage, Skeleton, StateChip],
  templateUrl: './payments-page.html',
  styleUrl: './payments-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PaymentsPage {
  readonly #client = inject(MyPaymentsClient);
  readonly #leave = inject(LEAVE);

  protected readonly charges = signal<readonly Charge[] | null>(null);
  protected readonly problem = signal<Problem | null>(null);
  /** The charge whose pay page is being opened. */
  protected readonly opening = signal<string | null>(null);
  protected readonly owed = computed(() => this.#having((status) => status === 'open'));
  protected readonly past = computed(() =>
    this.#having((status) => status === 'paid' || status === 'refunded'),
  );
  /** The sum of what is owed; null where it is one charge alone, or in more than one currency. */
  protected readonly total = computed(() => {
    const owed = this.owed();
    const [first] = owed;
    if (!first || owed.length < 2) return null;
    if (owed.some(({ currency }) => currency !== first.currency)) return null;
    const sum = owed.reduce((total, { amountMinor }) => total + amountMinor, 0);
    return formatMoney(sum, first.currency);
  });

  protected readonly amountOf = amountOf;
  protected readonly classTime = classTime;
  protected readonly dayOf = dayOf;
  protected readonly stateOf = stateOf;

  constructor() {
    void this.load();
  }

  protected async load(): Promise<void> {
    this.problem.set(null);
    try {
      this.charges.set(await firstValueFrom(this.#client.list()));
    } catch (error) {
      this.problem.set(toProblem(error));
    }
  }

  protected async pay(charge: Charge): Promise<void> {
    if (this.opening() !== null) return;
    this.opening.set(charge.id);
    this.problem.set(null);
    try {
      this.#leave(await firstValueFrom(this.#client.checkOut(charge)));
    } catch (error) {
      this.problem.set(toProblem(error));
      this.opening.set(null);
    }
  }

  #having(wanted: (status: Charge['status']) => boolean): readonly Charge[] {
    return (this.charges() ?? []).filter(({ status }) => wanted(status));
  }
}

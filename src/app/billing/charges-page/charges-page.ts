import { ChangeDetectionStrategy, Component, DestroyRef, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel, MatPrefix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatOption, MatSelect } from '@angular/material/select';
import { RouterLink } from '@angular/router';
import type { Charge, StaffCharge } from '@shared/contracts/billing-contract';
import { debounceTime, distinctUntilChanged, firstValueFrom, map } from 'rxjs';
import { LEAVE } from '../../core/leave';
import { areaOf, mayOpen } from '../../core/navigation';
import { PagedList } from '../../core/paged-list';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { amountOf, classTime, dayOf, stateOf } from '../../ui/charge/charge-words';
import { Icon } from '../../ui/icon/icon';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { BillingClient } from '../billing-client';

const typingPauseMs = 250;

/** Every charge of the reader's sites, what is owed first asked for. */
@Component({
  selector: 'app-charges-page',
  imports: [
    EmptyState,
    Icon,
    MatButton,
    MatFormField,
    MatInput,
    MatLabel,
    MatOption,
    MatPrefix,
    MatSelect,
    PageHeader,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    ShowMore,
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

  readonly #roles = inject(Session).roles();

  protected readonly takesPayments = this.#roles.includes('front-desk');
  protected readonly mayOpenPatients = mayOpen(areaOf('patients'), this.#roles);
  protected readonly status = signal<Charge['status'] | null>('open');
  protected readonly query = new FormControl('', { nonNullable: true });
  protected readonly list = new PagedList<StaffCharge>(
    (cursor) => this.#client.charges({ status: this.status(), q: this.query.value.trim(), cursor }),
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
    this.query.valueChanges
      .pipe(
        debounceTime(typingPauseMs),
        map((query) => query.trim()),
        distinctUntilChanged(),
        takeUntilDestroyed(),
      )
      .subscribe(() => {
        this.list.restart();
      });
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

import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  inject,
  input,
  signal,
  type OnInit,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, RouterLink } from '@angular/router';
import type { Charge } from '@shared/contracts/billing-contract';
import { firstValueFrom, switchMap, takeWhile, timer } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { amountOf, classTime } from '../../ui/charge/charge-words';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { LEAVE } from '../../core/leave';
import { MyPaymentsClient } from '../my-payments-client';

const ASK_EVERY_MS = 2000;
/** The service tells within seconds; what it did not tell, the server asks for every ten minutes. */
const ASK_AT_MOST = 30;

/** Where the payment service leads back to: it says "received" only when the server knows so. */
@Component({
  selector: 'app-payment-page',
  imports: [MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton],
  templateUrl: './payment-page.html',
  styleUrl: './payment-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PaymentPage implements OnInit {
  readonly #client = inject(MyPaymentsClient);
  readonly #session = inject(Session);
  readonly #destroyed = inject(DestroyRef);
  readonly #leave = inject(LEAVE);
  readonly #comesFromPaying = inject(ActivatedRoute).snapshot.queryParamMap.get('paid') === 'yes';

  readonly chargeId = input.required<string>();

  protected readonly charge = signal<Charge | null>(null);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly opening = signal(false);
  protected readonly state = computed(() => {
    const status = this.charge()?.status;
    if (status === undefined) return 'loading';
    if (status !== 'open') return status;
    return this.#comesFromPaying ? 'pending' : 'open';
  });
  protected readonly back = computed(() =>
    this.#session.roles().includes('patient')
      ? { path: '/my/payments', words: 'See your payments' }
      : { path: '/billing', words: 'Back to billing' },
  );
  protected readonly amountOf = amountOf;
  protected readonly classTime = classTime;

  ngOnInit(): void {
    timer(0, ASK_EVERY_MS)
      .pipe(
        switchMap(() => this.#client.read(this.chargeId())),
        takeWhile(
          ({ status }, asked) =>
            this.#comesFromPaying && status === 'open' && asked + 1 < ASK_AT_MOST,
          true,
        ),
        takeUntilDestroyed(this.#destroyed),
      )
      .subscribe({
        next: (charge) => this.charge.set(charge),
        error: (error: unknown) => this.problem.set(toProblem(error)),
      });
  }

  protected async pay(charge: Charge): Promise<void> {
    this.opening.set(true);
    this.problem.set(null);
    try {
      this.#leave(await firstValueFrom(this.#client.checkOut(charge)));
    } catch (error) {
      this.problem.set(toProblem(error));
      this.opening.set(false);
    }
  }
}

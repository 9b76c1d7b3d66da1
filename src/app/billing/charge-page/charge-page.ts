import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { areaOf, mayOpen } from '../../core/navigation';
import { failureOf, valueOf } from '../../core/resource-state';
import { Session } from '../../core/session';
import { amountOf, classTime, stateOf } from '../../ui/charge/charge-words';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { BillingClient } from '../billing-client';
import { stepsOf } from './charge-steps';

/** One charge: for whom and what it is, who took or returned the money, and when. */
@Component({
  selector: 'app-charge-page',
  imports: [MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton, StateChip],
  templateUrl: './charge-page.html',
  styleUrl: './charge-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChargePage {
  readonly #roles = inject(Session).roles();
  /** From the route. */
  readonly id = input.required<string>();

  protected readonly read = inject(BillingClient).history(this.id);
  protected readonly problem = computed(() => failureOf(this.read));
  protected readonly charge = computed(() => valueOf(this.read)?.charge);
  protected readonly steps = computed(() => {
    const history = valueOf(this.read);
    return history ? stepsOf(history) : [];
  });
  protected readonly mayOpenPatients = mayOpen(areaOf('patients'), this.#roles);
  protected readonly atDesk = this.#roles.includes('front-desk');
  protected readonly amountOf = amountOf;
  protected readonly classTime = classTime;
  protected readonly stateOf = stateOf;
}

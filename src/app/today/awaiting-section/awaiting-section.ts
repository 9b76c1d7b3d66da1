import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  signal,
  viewChildren,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { AwaitingCard } from '../awaiting-card/awaiting-card';
import { TodayClient } from '../today-client';

/** The ranges that wait for the physician, the longest waiting first; who signs one comes to the next. */
@Component({
  selector: 'app-awaiting-section',
  imports: [AwaitingCard, EmptyState, MatButton, ProblemMessage, Skeleton],
  templateUrl: './awaiting-section.html',
  styleUrl: './awaiting-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AwaitingSection {
  readonly #resource = inject(TodayClient).awaiting();
  protected readonly cards = viewChildren(AwaitingCard);
  readonly #signed = signal<ReadonlySet<string>>(new Set());

  protected readonly list = computed(() => valueOf(this.#resource));
  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly left = computed(() => (this.list()?.total ?? 0) - this.#signed().size);
  /** All that are shown are signed, and more wait. */
  protected readonly more = computed(() => {
    const list = this.list();
    return list !== undefined && this.#signed().size === list.items.length && this.left() > 0;
  });

  protected goOn(id: string): void {
    this.#signed.update((signed) => new Set([...signed, id]));
    const next = this.cards().find((card) => !this.#signed().has(card.item().id));
    next?.focus();
  }

  protected reload(): void {
    this.#signed.set(new Set());
    this.#resource.reload();
  }
}

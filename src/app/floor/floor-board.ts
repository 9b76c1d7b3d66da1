import { DOCUMENT, Injectable, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import type { Reading, Roster, RosterItem } from '@shared/contracts/floor-contract';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import { interval } from 'rxjs';
import { Bookings } from '../core/bookings';
import { LiveChanges } from '../core/live-changes';
import { type Problem, toProblem } from '../core/problem';
import { EntryQueue, type Saved } from './entry-queue/entry-queue';
import { FloorClient } from './floor-client';
import { visitOf } from './visit/visit';

const pollEvery = 12_000;
const tickEvery = 5_000;
/** Ranges change without a write to the visits, so the whole roster is read again now and then. */
const readAgainAfter = 120_000;

function withReading(item: RosterItem, reading: Reading): RosterItem {
  const others = item.readings
    .filter(({ id }) => id !== reading.id)
    .map((one) => (one.id === reading.amends ? { ...one, status: 'amended' as const } : one));
  return { ...item, readings: [...others, reading] };
}

function withSaved(item: RosterItem, saved: Saved): RosterItem {
  if (item.appointmentId !== saved.appointmentId) return item;
  if (saved.kind === 'reading') return withReading(item, saved.stored);
  if (saved.kind === 'work') return { ...item, work: saved.stored };
  return { ...item, record: saved.stored };
}

/** One class on the floor: its roster, kept up to date, with what was entered here on top. */
@Injectable()
export class FloorBoard {
  readonly #client = inject(FloorClient);
  readonly #bookings = inject(Bookings);
  readonly #queue = inject(EntryQueue);
  readonly #document = inject(DOCUMENT);
  readonly #roster = signal<Roster | null>(null);
  readonly #problem = signal<Problem | null>(null);
  readonly #reachedAt = signal<Date | null>(null);
  readonly #connected = signal(true);
  readonly #localNow = signal(new Date());
  readonly #offset = signal(0);
  #classDateId: string | null = null;
  #stamp = '';
  #readAt = 0;

  readonly problem = this.#problem.asReadonly();
  readonly loaded = computed(() => this.#roster() !== null);
  readonly notShown = computed(() => this.#roster()?.notShown ?? 0);
  /** Whether the last poll was answered, and when one was. */
  readonly connected = this.#connected.asReadonly();
  readonly reachedAt = this.#reachedAt.asReadonly();
  /** The server's clock: a tablet that is wrong about the time writes down the right one all the same. */
  readonly now = computed(() => new Date(this.#localNow().getTime() + this.#offset()));
  readonly visits = computed(() =>
    (this.#roster()?.items ?? []).map((item) => visitOf(item, this.#queue.entries())),
  );

  constructor() {
    const ended = takeUntilDestroyed();
    interval(tickEvery)
      .pipe(ended)
      .subscribe(() => this.#localNow.set(new Date()));
    const live = inject(LiveChanges);
    const isHere = (patientId: string): boolean =>
      this.#roster()?.items.some((item) => item.patientId === patientId) ?? false;
    live
      .of(['range'], isHere)
      .pipe(takeUntilDestroyed())
      .subscribe(() => void this.reload());
    live
      .of(['visit'], isHere)
      .pipe(takeUntilDestroyed())
      .subscribe(() => void this.#poll());
    interval(pollEvery)
      .pipe(takeUntilDestroyed())
      .subscribe(() => void this.#poll());
    this.#queue.saved
      .pipe(takeUntilDestroyed())
      .subscribe((saved) => this.#change((item) => withSaved(item, saved)));
  }

  /** The instant of a press, by the server's clock. */
  instant(): Date {
    return new Date(Date.now() + this.#offset());
  }

  async open(classDateId: string): Promise<void> {
    if (this.#classDateId !== classDateId) this.#roster.set(null);
    this.#classDateId = classDateId;
    await this.reload();
  }

  async reload(): Promise<void> {
    const classDateId = this.#classDateId;
    if (classDateId === null) return;
    try {
      const stamp = await this.#client.stamp(classDateId);
      const roster = await this.#client.roster(classDateId);
      if (classDateId !== this.#classDateId) return;
      this.#stamp = stamp;
      this.#readAt = Date.now();
      this.#roster.set(roster);
      this.#offset.set(Date.parse(roster.at) - Date.now());
      this.#localNow.set(new Date());
      this.#problem.set(null);
      this.#reached();
    } catch (error) {
      this.#missed(toProblem(error));
    }
  }

  /** @throws Problem when it was not done; the roster is read again then, since somebody else may have */
  async changeStatus(appointmentId: string, ...statuses: AppointmentStatus[]): Promise<void> {
    try {
      for (const status of statuses) {
        const item = this.#roster()?.items.find((one) => one.appointmentId === appointmentId);
        if (!item) return;
        const { version } = await this.#bookings.change(appointmentId, {
          status,
          version: item.version,
        });
        this.#change((one) =>
          one.appointmentId === appointmentId ? { ...one, status, version } : one,
        );
      }
    } finally {
      await this.reload();
    }
  }

  /** @throws Problem when it was not written down */
  async missedDose(appointmentId: string, missed: boolean): Promise<void> {
    await this.#client.missedDose(appointmentId, missed);
    await this.reload();
  }

  /** @throws Problem when it was not signed */
  async sign(recordId: string, exercised: boolean): Promise<void> {
    await this.#client.sign(recordId, exercised);
    await this.reload();
  }

  async #poll(): Promise<void> {
    if (this.#classDateId === null || this.#document.visibilityState === 'hidden') return;
    if (this.#roster() === null) return this.reload();
    try {
      const stamp = await this.#client.stamp(this.#classDateId);
      this.#reached();
      if (stamp !== this.#stamp || Date.now() - this.#readAt > readAgainAfter) await this.reload();
    } catch (error) {
      this.#missed(toProblem(error));
    }
  }

  #reached(): void {
    if (!this.#connected()) this.#queue.sendAgain();
    this.#connected.set(true);
    this.#reachedAt.set(this.instant());
  }

  /** With a roster on the page a missed poll is told of in its head; without one it is all there is to tell. */
  #missed(problem: Problem): void {
    this.#connected.set(false);
    if (this.#roster() === null) this.#problem.set(problem);
  }

  #change(change: (item: RosterItem) => RosterItem): void {
    this.#roster.update((roster) => roster && { ...roster, items: roster.items.map(change) });
  }
}

import { DOCUMENT, DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import type { Reading, SessionRecord } from '@shared/contracts/floor-contract';
import type { Bout } from '@shared/contracts/progression-contract';
import { Subject } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { Session } from '../../core/session';
import { FloorClient } from '../floor-client';
import { type Entry, type NewEntry, type RecordEntry, mayPass, pauseAfter } from './entry';

/** What the server stored of an entry. */
export type Saved =
  | { readonly kind: 'record'; readonly appointmentId: string; readonly stored: SessionRecord }
  | { readonly kind: 'reading'; readonly appointmentId: string; readonly stored: Reading }
  | { readonly kind: 'work'; readonly appointmentId: string; readonly stored: Bout };

/** An entry that waited for its record, now that the record's id is sure. */
function inRecord(entry: Entry, sessionRecordId: string): Entry {
  if (entry.kind === 'reading') return { ...entry, body: { ...entry.body, sessionRecordId } };
  return entry.kind === 'work' ? { ...entry, body: { ...entry.body, sessionRecordId } } : entry;
}

/**
 * Entries that the server has not acknowledged yet. They keep their ids, go out one visit at a time in the order in
 * which they were made, and are tried again with growing pauses while the network is away. They live in this page's
 * memory: closing it with entries left asks first.
 */
@Injectable({ providedIn: 'root' })
export class EntryQueue {
  readonly #client = inject(FloorClient);
  readonly #session = inject(Session);
  readonly #entries = signal<readonly Entry[]>([]);
  /** Visits that are being sent, and how often the head of each has failed. */
  readonly #busy = new Set<string>();
  readonly #tries = new Map<string, number>();
  readonly #saved = new Subject<Saved>();

  readonly entries = this.#entries.asReadonly();
  readonly kept = computed(() => this.#entries().filter(({ state }) => state === 'kept').length);
  readonly saved = this.#saved.asObservable();

  constructor() {
    const view = inject(DOCUMENT).defaultView;
    const again = (): void => this.sendAgain();
    const ask = (event: BeforeUnloadEvent): void => {
      if (this.#entries().length > 0) event.preventDefault();
    };
    view?.addEventListener('online', again);
    view?.addEventListener('beforeunload', ask);
    inject(DestroyRef).onDestroy(() => {
      view?.removeEventListener('online', again);
      view?.removeEventListener('beforeunload', ask);
    });
  }

  add(entry: NewEntry): void {
    const userId = this.#session.user()?.id ?? '';
    this.#entries.update((all) => [...all, { ...entry, userId, state: 'sending', problem: null }]);
    void this.#send(entry.appointmentId);
  }

  /** Tries everything now that waits. */
  sendAgain(): void {
    for (const visit of new Set(this.#entries().map(({ appointmentId }) => appointmentId))) {
      void this.#send(visit);
    }
  }

  /** Gives a refused entry up, at a person's word. */
  discard(id: string): void {
    this.#entries.update((all) =>
      all.filter((entry) => entry.id !== id || entry.state !== 'refused'),
    );
  }

  /** Tries a refused entry once more, as after a check-in. */
  retry(id: string): void {
    const entry = this.#entries().find((one) => one.id === id);
    if (!entry) return;
    this.#change(id, { state: 'sending', problem: null });
    void this.#send(entry.appointmentId);
  }

  #next(visit: string): Entry | undefined {
    const mine = this.#session.user()?.id;
    const ofVisit = this.#entries().filter(({ appointmentId }) => appointmentId === visit);
    // Without its record no reading can be stored.
    if (ofVisit.some(({ kind, state }) => kind === 'record' && state === 'refused'))
      return undefined;
    return ofVisit.find(({ state, userId }) => state !== 'refused' && userId === mine);
  }

  async #send(visit: string): Promise<void> {
    if (this.#busy.has(visit)) return;
    this.#busy.add(visit);
    try {
      for (let entry = this.#next(visit); entry; entry = this.#next(visit)) {
        if (!(await this.#sendOne(entry))) break;
      }
    } finally {
      this.#busy.delete(visit);
    }
  }

  /** @returns whether the next one may go */
  async #sendOne(entry: Entry): Promise<boolean> {
    try {
      this.#take(entry, await this.#deliver(entry));
      return true;
    } catch (error) {
      return this.#fail(entry, toProblem(error));
    }
  }

  async #deliver(entry: Entry): Promise<Saved> {
    const { appointmentId } = entry;
    switch (entry.kind) {
      case 'record':
        return { kind: 'record', appointmentId, stored: await this.#begin(entry) };
      case 'reading': {
        const stored = await this.#client.record(entry.id, entry.body);
        return { kind: 'reading', appointmentId, stored };
      }
      case 'work': {
        const stored = await this.#client.work(entry.id, entry.body);
        return { kind: 'work', appointmentId, stored };
      }
      case 'amendment': {
        const stored = await this.#client.amend(entry.originalId, entry.body);
        return { kind: 'reading', appointmentId, stored };
      }
    }
  }

  /** Begins a record; when another tablet was first, what was entered here goes to its record. */
  async #begin({ id, body, classDateId }: RecordEntry): Promise<SessionRecord> {
    try {
      return await this.#client.beginRecord(id, body);
    } catch (error) {
      const problem = toProblem(error);
      if (problem.code !== 'already-recorded') throw problem;
      const { items } = await this.#client.roster(classDateId);
      const visit = items.find(({ appointmentId }) => appointmentId === body.appointmentId);
      if (!visit?.record || visit.record.id === id) throw problem;
      const { appointmentId, patientId, prescriptionId, record, readings } = visit;
      return { ...record, appointmentId, patientId, prescriptionId, exercised: null, readings };
    }
  }

  #take({ id, kind, appointmentId }: Entry, saved: Saved): void {
    this.#tries.delete(appointmentId);
    const recordId = saved.stored.id;
    this.#entries.update((all) =>
      all
        .filter((entry) => entry.id !== id)
        .map((entry) =>
          kind === 'record' && entry.appointmentId === appointmentId
            ? inRecord(entry, recordId)
            : entry,
        ),
    );
    this.#saved.next(saved);
  }

  #fail({ id, kind, appointmentId }: Entry, problem: Problem): boolean {
    if (!mayPass(problem)) {
      this.#change(id, { state: 'refused', problem });
      return kind !== 'record';
    }
    this.#change(id, { state: 'kept', problem });
    const tries = (this.#tries.get(appointmentId) ?? 0) + 1;
    this.#tries.set(appointmentId, tries);
    const pause = Math.max(pauseAfter(tries), (problem.retryAfter ?? 0) * 1000);
    setTimeout(() => void this.#send(appointmentId), pause);
    return false;
  }

  #change(id: string, change: Partial<Pick<Entry, 'state' | 'problem'>>): void {
    this.#entries.update((all) =>
      all.map((entry) => (entry.id === id ? { ...entry, ...change } : entry)),
    );
  }
}

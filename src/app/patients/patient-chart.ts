import { Injectable, computed, inject, signal } from '@angular/core';
import type {
  NewRecordEntryInput,
  PatientRecord,
  RecordKind,
} from '@shared/contracts/record-contract';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { firstValueFrom } from 'rxjs';
import { LiveChanges } from '../core/live-changes';
import { Notices } from '../core/notices';
import { toProblem } from '../core/problem';
import { PatientAccess } from './patient-access';
import { PatientsClient } from './patients-client';

/** The patient whose page is open, for the page and its sections: read once, and again after every change. */
@Injectable()
export class PatientChart {
  readonly #client = inject(PatientsClient);
  readonly #notices = inject(Notices);
  readonly #access = inject(PatientAccess);

  /** Undefined until the page is open. */
  readonly id = signal<string | undefined>(undefined);
  readonly patient = this.#client.patient(this.id);
  readonly record = this.#client.record(
    computed(() => (this.#access.chart() ? this.id() : undefined)),
  );

  constructor() {
    inject(LiveChanges)
      .of(['range'], (patientId) => patientId === this.id())
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.reload());
  }

  reload(): void {
    this.patient.reload();
    this.record.reload();
  }

  /** Adds entries and offers to take them back. @throws Problem, with nothing entered */
  async add(entries: NewRecordEntryInput[], said: string): Promise<void> {
    const id = this.#opened();
    const added = await firstValueFrom(this.#client.addEntries(id, entries));
    this.reload();
    const undo = () => {
      // The last first: an entry may name one before it.
      const taken = added.map((entry, index) => ({ id: entry.id, kind: entries[index]?.kind }));
      void this.#takeBack(id, taken.reverse());
    };
    await this.#notices.offerUndo(said, undo);
  }

  async enterInError(kind: RecordKind, entryId: string): Promise<void> {
    await this.#told('Marked as entered in error. It stays to be read.', () =>
      firstValueFrom(this.#client.enterInError(this.#opened(), kind, entryId)),
    );
  }

  /** Stops a drug and offers to take the stop back. */
  async stopMedication(
    { id, values }: PatientRecord['medications'][number],
    stoppedOn: string,
  ): Promise<void> {
    const patientId = this.#opened();
    const stop = (date: string | null) =>
      firstValueFrom(this.#client.stopMedication(patientId, id, date));
    try {
      await stop(stoppedOn);
      this.reload();
      await this.#notices.offerUndo(`${values.name} stopped.`, () => {
        void this.#told(`${values.name} goes on.`, () => stop(null));
      });
    } catch (error) {
      await this.#sayWhy(error);
    }
  }

  async retireThreshold(entryId: string, reason: string): Promise<void> {
    await this.#told('Retired: it no longer binds.', () =>
      firstValueFrom(this.#client.retireThreshold(this.#opened(), entryId, reason)),
    );
  }

  async supersedeThreshold(entryId: string, testId: string): Promise<void> {
    await this.#told('Superseded: it no longer binds.', () =>
      firstValueFrom(
        this.#client.endEntry(this.#opened(), `thresholds/${entryId}/supersede`, {
          exerciseTestId: testId,
        }),
      ),
    );
  }

  async liftRestriction(entryId: string, reason: string): Promise<void> {
    await this.#told('Lifted: it no longer holds.', () =>
      firstValueFrom(
        this.#client.endEntry(this.#opened(), `restrictions/${entryId}/lift`, { reason }),
      ),
    );
  }

  async closeFollowUp(entryId: string, done: string): Promise<void> {
    await this.#told('Closed, with what was done.', () =>
      firstValueFrom(
        this.#client.endEntry(this.#opened(), `questionnaires/${entryId}/close-follow-up`, {
          done,
        }),
      ),
    );
  }

  /** Does a change, reads the page again and says so; a failure is said in the same place. */
  async #told(said: string, change: () => Promise<unknown>): Promise<void> {
    try {
      await change();
      this.reload();
      await this.#notices.say(said);
    } catch (error) {
      await this.#sayWhy(error);
    }
  }

  async #takeBack(
    id: string,
    entries: { id: string; kind: RecordKind | undefined }[],
  ): Promise<void> {
    await this.#told('Taken back: it stands as entered in error.', async () => {
      for (const entry of entries) {
        if (entry.kind) await firstValueFrom(this.#client.enterInError(id, entry.kind, entry.id));
      }
    });
  }

  async #sayWhy(error: unknown): Promise<void> {
    const { title, errors } = toProblem(error);
    await this.#notices.say(errors[0]?.message ?? title);
  }

  #opened(): string {
    const id = this.id();
    if (id === undefined) throw new Error('No patient is open');
    return id;
  }
}

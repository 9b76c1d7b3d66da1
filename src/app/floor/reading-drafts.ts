import { Injectable, signal } from '@angular/core';
import type { VitalPhase } from '@shared/clinical/vital-sign-bounds';
import { type ReadingDraft, emptyDraft } from './reading-draft';
import { type Visit, currentReadings } from './visit/visit';

/** At rest first, then at exercise; once in recovery a visit stays there. */
export function phaseAfter(visit: Visit): VitalPhase {
  const last = currentReadings(visit.readings).at(-1)?.phase;
  if (last === undefined) return 'resting';
  return last === 'resting' ? 'exercise' : last;
}

/** What is typed and not saved, one draft a visit: going to another patient and back loses nothing. */
@Injectable()
export class ReadingDrafts {
  readonly #drafts = signal<ReadonlyMap<string, ReadingDraft>>(new Map());

  of(visit: Visit): ReadingDraft {
    return this.#drafts().get(visit.appointmentId) ?? emptyDraft(phaseAfter(visit));
  }

  keep({ appointmentId }: Visit, draft: ReadingDraft): void {
    this.#drafts.update((drafts) => new Map(drafts).set(appointmentId, draft));
  }

  /** The next reading starts empty. */
  clear({ appointmentId }: Visit): void {
    this.#drafts.update((drafts) => {
      const left = new Map(drafts);
      left.delete(appointmentId);
      return left;
    });
  }
}

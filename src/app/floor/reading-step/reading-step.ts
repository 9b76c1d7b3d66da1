import type { ElementRef } from '@angular/core';
import {
  ChangeDetectionStrategy,
  Component,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  viewChild,
} from '@angular/core';
import { v7 as uuidv7 } from 'uuid';
import { EntryQueue } from '../entry-queue/entry-queue';
import { FloorBoard } from '../floor-board';
import { clockText } from '../floor-time';
import { type ReadingDraft, canSave, valuesOf } from '../reading-draft';
import { ReadingDrafts } from '../reading-drafts';
import { ReadingPad } from '../reading-pad/reading-pad';
import type { Visit } from '../visit/visit';

const minute = 60_000;
/** So far back a reading may be written down with a press; later ones are amendments of the time. */
const longestAgo = 15;

/** Enters the next reading of a visit. Saving hands it to the queue and begins the next at once. */
@Component({
  selector: 'app-reading-step',
  imports: [ReadingPad],
  templateUrl: './reading-step.html',
  styleUrl: './reading-step.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReadingStep {
  readonly #board = inject(FloorBoard);
  readonly #queue = inject(EntryQueue);
  readonly #drafts = inject(ReadingDrafts);
  readonly #injector = inject(Injector);
  readonly visit = input.required<Visit>();
  readonly classDateId = input.required<string>();
  readonly timeZone = input.required<string>();

  private readonly pad = viewChild.required(ReadingPad);
  private readonly saveButton = viewChild.required<ElementRef<HTMLButtonElement>>('saveButton');

  protected readonly longestAgo = longestAgo;
  protected readonly draft = computed(() => this.#drafts.of(this.visit()));
  protected readonly canSave = computed(() => canSave(this.draft()));
  protected readonly time = computed(() => {
    const at = new Date(this.#board.now().getTime() - this.draft().minutesAgo * minute);
    return clockText(at, this.timeZone());
  });

  focus(): void {
    this.pad().focus();
  }

  protected keep(draft: ReadingDraft): void {
    this.#drafts.keep(this.visit(), draft);
  }

  protected earlier(minutes: number): void {
    const minutesAgo = minutes === 0 ? 0 : Math.min(longestAgo, this.draft().minutesAgo + minutes);
    this.keep({ ...this.draft(), minutesAgo });
  }

  protected toSave(): void {
    this.saveButton().nativeElement.focus();
  }

  /** A second press finds the next draft, which is empty, and saves nothing. */
  protected save(): void {
    const visit = this.visit();
    const draft = this.draft();
    const { appointmentId, recordId } = visit;
    if (!canSave(draft) || recordId === null) return;
    const measuredAt = new Date(this.#board.instant().getTime() - draft.minutesAgo * minute);
    this.#drafts.clear(visit);
    this.#queue.add({
      kind: 'reading',
      id: uuidv7(),
      appointmentId,
      classDateId: this.classDateId(),
      body: {
        sessionRecordId: recordId,
        phase: draft.phase,
        measuredAt: measuredAt.toISOString(),
        ...valuesOf(draft),
      },
    });
    afterNextRender(() => this.focus(), { injector: this.#injector });
  }
}

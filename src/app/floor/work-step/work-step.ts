import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { v7 as uuidv7 } from 'uuid';
import { type Work, WorkForm } from '../../ui/work-form/work-form';
import { loadText, startWords } from '../../ui/words/load-words';
import { EntryQueue } from '../entry-queue/entry-queue';
import type { Visit } from '../visit/visit';

/** What this session starts with, and how the machine was set at the end of conditioning. */
@Component({
  selector: 'app-work-step',
  imports: [MatButton, WorkForm],
  template: `
    @if (start(); as line) {
      <p class="num">
        <b>Start:</b> {{ line.load }} <span class="muted">({{ line.from }})</span>
      </p>
    }
    @if (done(); as line) {
      <p class="num" role="status">
        <b>Work:</b> {{ line }}
        @if (unsent()) {
          <span class="muted">kept here, sending…</span>
        }
      </p>
    }
    @if (canWrite()) {
      @if (open()) {
        <app-work-form action="Save work" [start]="begins()" (sent)="save($event)" />
      } @else {
        <button type="button" matButton="outlined" (click)="open.set(true)">
          {{ done() ? 'Change the work' : 'Write down the work' }}
        </button>
      }
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 0.5rem;
    }
    p {
      margin: 0;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkStep {
  readonly #queue = inject(EntryQueue);
  readonly visit = input.required<Visit>();
  readonly classDateId = input.required<string>();
  readonly canWrite = input.required<boolean>();
  protected readonly open = signal(false);

  protected readonly start = computed(() => {
    const { nextStart } = this.visit();
    return nextStart && { load: loadText(nextStart.load), from: startWords(nextStart) };
  });
  protected readonly unsent = computed(() => this.visit().workEntry !== null);
  protected readonly done = computed(() => {
    const { work } = this.visit();
    return work && loadText(work);
  });
  protected readonly begins = computed<Work | null>(
    () => this.visit().work ?? this.visit().nextStart?.load ?? null,
  );

  protected save({ setting, minutes }: Work): void {
    const { appointmentId, recordId } = this.visit();
    if (recordId === null) return;
    this.#queue.add({
      kind: 'work',
      id: uuidv7(),
      appointmentId,
      classDateId: this.classDateId(),
      body: { sessionRecordId: recordId, setting, minutes, shortBouts: false },
    });
    this.open.set(false);
  }
}

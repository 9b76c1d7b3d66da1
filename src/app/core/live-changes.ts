import { DOCUMENT, Injectable, inject } from '@angular/core';
import { type Change, type ChangeTopic, changeSchema } from '@shared/contracts/live-contract';
import { Observable, auditTime, filter, map, share } from 'rxjs';

/** Everything may have changed: the stream was away for a while. */
const everything = null;

/** After the server refused the stream (signed out, restarting) it is asked for again. */
const askAgainMs = 15_000;
/** Several changes of one save make one reading. */
const gatherMs = 150;

/** What others change while a page is open, told by the server; a page that nobody looks at holds no stream. */
@Injectable({ providedIn: 'root' })
export class LiveChanges {
  readonly #document = inject(DOCUMENT);
  readonly #changes = new Observable<Change | typeof everything>((subscriber) => {
    const view = this.#document.defaultView;
    if (!view || !('EventSource' in view)) return;
    let source: EventSource | null = null;
    let opened = false;
    let timer: ReturnType<typeof setTimeout> | undefined;

    const close = (): void => {
      clearTimeout(timer);
      source?.close();
      source = null;
    };
    const open = (): void => {
      close();
      if (this.#document.visibilityState === 'hidden') return;
      source = new EventSource('/api/events');
      source.addEventListener('ready', () => {
        // What happened before the first opening is on the page already.
        if (opened) subscriber.next(everything);
        opened = true;
      });
      source.addEventListener('missed', () => subscriber.next(everything));
      source.addEventListener('change', ({ data }: MessageEvent<string>) =>
        subscriber.next(changeSchema.parse(JSON.parse(data))),
      );
      source.addEventListener('error', () => {
        if (source?.readyState === EventSource.CLOSED) timer = setTimeout(open, askAgainMs);
      });
    };
    open();
    this.#document.addEventListener('visibilitychange', open);
    return () => {
      this.#document.removeEventListener('visibilitychange', open);
      close();
    };
  }).pipe(share());

  /**
   * Emits when what a page shows may have changed, and the page reads it again.
   * @param shows whether the patient's record is on the page; left out: anybody's
   */
  of(topics: readonly ChangeTopic[], shows?: (patientId: string) => boolean): Observable<void> {
    return this.#changes.pipe(
      filter((change) => {
        if (change === everything) return true;
        const { topic, patientId } = change;
        return topics.includes(topic) && (!shows || patientId === null || shows(patientId));
      }),
      auditTime(gatherMs),
      map(() => undefined),
    );
  }
}

import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import type { SessionRecord } from '@shared/contracts/floor-contract';
import { Problem } from '../../core/problem';
import { Session } from '../../core/session';
import { FloorClient } from '../floor-client';
import { sampleItem, sampleReading } from '../visit/roster-sample';
import { mayPass, pauseAfter, type NewEntry } from './entry';
import { EntryQueue } from './entry-queue';

const away = new Problem('unreachable', 'Plimsoll can’t be reached.', 0);
const refusal = new Problem('not-checked-in', 'Check the patient in first.', 409);

const record: NewEntry = {
  kind: 'record',
  id: 'record-here',
  appointmentId: 'visit',
  classDateId: 'class',
  body: { appointmentId: 'visit', startedAt: '2026-12-01T14:00:00Z' },
};
const reading = (id: string, appointmentId = 'visit'): NewEntry => ({
  kind: 'reading',
  id,
  appointmentId,
  classDateId: 'class',
  body: {
    sessionRecordId: 'record-here',
    phase: 'exercise',
    measuredAt: '2026-12-01T14:00:00Z',
    heartRate: 100,
  },
});

describe('EntryQueue', () => {
  const user = signal<{ id: string } | null>({ id: 'nurse' });
  /** What each call answers; what is left out succeeds. */
  let answers: (Problem | 'hold')[];
  let calls: { name: string; id: string; body: unknown }[];
  let release: () => void;
  let queue: EntryQueue;
  let saved: string[];

  async function call<T>(name: string, id: string, body: unknown, stored: T): Promise<T> {
    calls.push({ name, id, body });
    const answer = answers.shift();
    if (answer === 'hold') await new Promise<void>((resolve) => (release = resolve));
    else if (answer) throw answer;
    return stored;
  }

  beforeEach(() => {
    vi.useFakeTimers();
    user.set({ id: 'nurse' });
    [answers, calls, saved] = [[], [], []];
    const client: Pick<FloorClient, 'beginRecord' | 'record' | 'amend' | 'roster'> = {
      beginRecord: (id, body) => call('begin', id, body, { id } as SessionRecord),
      record: (id, body) => call('read', id, body, { ...sampleReading(1), id }),
      amend: (id, body) => call('amend', id, body, sampleReading(2)),
      roster: () => {
        const item = sampleItem({ appointmentId: 'visit' });
        return Promise.resolve({ items: [item], notShown: 0, at: '' });
      },
    };
    TestBed.configureTestingModule({
      providers: [
        { provide: FloorClient, useValue: client },
        { provide: Session, useValue: { user } },
      ],
    });
    queue = TestBed.inject(EntryQueue);
    queue.saved.subscribe(({ stored }) => saved.push(stored.id));
  });
  afterEach(() => vi.useRealTimers());

  const settle = () => vi.advanceTimersByTimeAsync(0);
  const names = () => calls.map(({ name, id }) => `${name} ${id}`);
  const states = () => queue.entries().map(({ id, state }) => `${id} ${state}`);

  it('sends a record before its readings, one after the other', async () => {
    answers = ['hold'];
    queue.add(record);
    queue.add(reading('one'));
    queue.add(reading('two'));
    await settle();
    expect(names()).toEqual(['begin record-here']);
    expect(states()).toEqual(['record-here sending', 'one sending', 'two sending']);
    release();
    await settle();
    expect(names()).toEqual(['begin record-here', 'read one', 'read two']);
    expect(saved).toEqual(['record-here', 'one', 'two']);
    expect(queue.entries()).toEqual([]);
  });

  it('lets one patient’s entries not wait for another’s', async () => {
    answers = ['hold'];
    queue.add(reading('one', 'visit'));
    queue.add(reading('two', 'other visit'));
    await settle();
    expect(saved).toEqual(['two']);
    release();
    await settle();
    expect(saved).toEqual(['two', 'one']);
  });

  it('keeps an entry while the network is away and sends the same id again, ever more slowly', async () => {
    answers = [away, away, away];
    queue.add(reading('one'));
    queue.add(reading('two'));
    await settle();
    expect(states()).toEqual(['one kept', 'two sending']);
    expect(queue.kept()).toBe(1);
    await vi.advanceTimersByTimeAsync(999);
    expect(calls).toHaveLength(1);
    await vi.advanceTimersByTimeAsync(1);
    expect(calls).toHaveLength(2);
    await vi.advanceTimersByTimeAsync(2000);
    expect(calls).toHaveLength(3);
    await vi.advanceTimersByTimeAsync(4000);
    expect(names()).toEqual(['read one', 'read one', 'read one', 'read one', 'read two']);
    expect(saved).toEqual(['one', 'two']);
  });

  it('tries at once when the network is back', async () => {
    answers = [away];
    queue.add(reading('one'));
    await settle();
    window.dispatchEvent(new Event('online'));
    await settle();
    expect(saved).toEqual(['one']);
  });

  it('keeps what the server refuses for a person, and goes on with the next', async () => {
    answers = [refusal];
    queue.add(reading('one'));
    queue.add(reading('two'));
    await settle();
    expect(states()).toEqual(['one refused']);
    expect(queue.entries()[0]?.problem?.title).toBe('Check the patient in first.');
    expect(saved).toEqual(['two']);
    queue.retry('one');
    await settle();
    expect(saved).toEqual(['two', 'one']);
  });

  it('gives up only what was refused', async () => {
    answers = [refusal, away];
    queue.add(reading('one'));
    queue.add(reading('two'));
    await settle();
    queue.discard('two');
    queue.discard('one');
    expect(states()).toEqual(['two kept']);
  });

  it('holds readings back while their record is refused', async () => {
    answers = [refusal];
    queue.add(record);
    queue.add(reading('one'));
    await settle();
    expect(names()).toEqual(['begin record-here']);
    queue.retry('record-here');
    await settle();
    expect(saved).toEqual(['record-here', 'one']);
  });

  it('takes the record that another tablet began', async () => {
    answers = [new Problem('already-recorded', 'Begun already.', 409)];
    queue.add(record);
    queue.add(reading('one'));
    await settle();
    const theirs = sampleItem().record?.id;
    expect(calls.at(-1)?.body).toMatchObject({ sessionRecordId: theirs });
    expect(saved).toEqual([theirs, 'one']);
  });

  it('sends in no other name than that of who entered it', async () => {
    answers = [new Problem('unauthenticated', 'Sign in to go on.', 401)];
    queue.add(reading('one'));
    await settle();
    user.set({ id: 'someone else' });
    queue.sendAgain();
    await vi.advanceTimersByTimeAsync(60_000);
    expect(calls).toHaveLength(1);
    user.set({ id: 'nurse' });
    queue.sendAgain();
    await settle();
    expect(saved).toEqual(['one']);
  });

  it('asks before the page is closed with entries left', async () => {
    const close = () => {
      const event = new Event('beforeunload', { cancelable: true });
      window.dispatchEvent(event);
      return event.defaultPrevented;
    };
    expect(close()).toBe(false);
    answers = [away];
    queue.add(reading('one'));
    await settle();
    expect(close()).toBe(true);
  });
});

describe('trying again', () => {
  it('pauses a second, then twice as long each time, up to half a minute', () => {
    expect([1, 2, 3, 5, 6, 20].map(pauseAfter)).toEqual([1000, 2000, 4000, 16_000, 30_000, 30_000]);
  });

  it('makes sense for what may pass by itself', () => {
    expect(mayPass({ code: 'unavailable', status: 503 })).toBe(true);
    expect(mayPass({ code: 'unreadable-answer', status: 502 })).toBe(true);
    expect(mayPass({ code: 'unreadable-answer', status: 200 })).toBe(false);
    expect(mayPass({ code: 'invalid-request', status: 422 })).toBe(false);
  });
});

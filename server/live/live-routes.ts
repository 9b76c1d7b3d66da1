import type { Response } from 'express';
import type { Change } from '@shared/contracts/live-contract';
import { isStaff, type Actor } from '../accounts/actor';
import { ok } from '../http/answers';
import { fail } from '../http/failure';
import { eventStream, route, type RouteDefinition } from '../http/route';
import { actorOfSession } from '../http/session-store';
import type { RecordChange } from './change-feed';

/** A session may end, or a site be taken away, while its stream is open: looked up again after this. */
const knownForMs = 2_000;
/** So that proxies keep the stream, and that a session which ended closes it. */
const heartbeatMs = 20_000;

/** Whether the change is of a record that the actor may open. */
export function concerns(actor: Actor, { patientId, siteId }: RecordChange): boolean {
  if (patientId === null || patientId === actor.patientId) return true;
  return siteId !== null && isStaff(actor) && actor.siteIds.includes(siteId);
}

/** @param currentActor null once the session has ended */
function streamTo(response: Response, currentActor: () => Promise<Actor | null>) {
  let known: { readonly actor: Actor | null; readonly at: number } | null = null;
  let line: Promise<void> = Promise.resolve();

  const actorNow = async (): Promise<Actor | null> => {
    if (known === null || Date.now() - known.at > knownForMs) {
      known = { actor: await currentActor(), at: Date.now() };
    }
    return known.actor;
  };
  /** One after another, so that they keep their order; a failed look-up ends the stream, and the page comes back. */
  const write = (text: (actor: Actor) => string | null): void => {
    line = line.then(async () => {
      if (response.writableEnded) return;
      const actor = await actorNow().catch(() => null);
      const told = actor && text(actor);
      if (actor === null) response.end();
      else if (told !== null) response.write(told);
    });
  };
  return {
    event: (name: 'ready' | 'missed') => write(() => `event: ${name}\ndata: {}\n\n`),
    change: (change: RecordChange) =>
      write((actor) => {
        if (!concerns(actor, change)) return null;
        const { topic, patientId } = change;
        return `event: change\ndata: ${JSON.stringify({ topic, patientId } satisfies Change)}\n\n`;
      }),
    heartbeat: () => write(() => ': still here\n\n'),
  };
}

/** What open pages learn of what others change. */
export const liveRoutes: RouteDefinition[] = [
  route({
    method: 'get',
    path: '/api/events',
    summary: 'Tells open pages what to read again, as server-sent events; ids alone',
    access: 'signed-in',
    audit: 'none',
    transaction: 'none',
    keepsSessionAlive: false,
    request: {},
    response: { 200: eventStream },
    handler: async ({ context, origin, http }) => {
      const { changes, database, clock } = context;
      const { sessionHash } = origin;
      if (sessionHash === null) return fail('unauthenticated');
      const stream = streamTo(http.response, () =>
        actorOfSession(database.$client, sessionHash, clock.now()),
      );
      // Who does not ask for a stream is told that there is one, and not kept waiting.
      if (!http.request.get('accept')?.includes('text/event-stream')) {
        return ok((response: Response) => void response.end('event: ready\ndata: {}\n\n'));
      }
      const stop = await changes.listen({
        changed: stream.change,
        missed: () => stream.event('missed'),
        ended: () => void http.response.end(),
      });
      const beat = setInterval(stream.heartbeat, heartbeatMs);
      http.response.once('close', () => {
        clearInterval(beat);
        stop();
      });
      return ok((response: Response) => {
        response.write('retry: 1000\n\n');
        stream.event('ready');
      });
    },
  }),
];

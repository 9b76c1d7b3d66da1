import type { Request } from 'express';
import type { Clock } from '../app-context';
import type { AuditSource } from '../audit/audit-service';
import { callId } from './problem';
import type { CallOrigin } from './route';
import { sessionHash } from './session-store';

export function originOf(request: Request): CallOrigin {
  return {
    id: callId(request),
    ip: request.ip ?? '',
    sessionHash: request.actor ? sessionHash(request.sessionID) : null,
  };
}

export function sourceOf(request: Request, clock: Clock): AuditSource {
  const { ip, sessionHash } = originOf(request);
  return { actorId: request.actor?.id ?? null, ip, sessionHash, at: clock.now() };
}

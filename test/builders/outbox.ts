import { sendMessage } from '../../server/messages/sending-service';
import type { TestApp } from './test-app';

export interface OutboxRow {
  readonly id: string;
  readonly kind: string;
  readonly status: string;
  readonly dedupe_key: string;
  readonly due_at: Date;
  readonly hold_until: Date | null;
  readonly last_error: string | null;
  readonly attempts: number;
}

export async function outboxOf({ context }: TestApp, kind?: string): Promise<OutboxRow[]> {
  const { rows } = await context.database.$client.query<OutboxRow>(
    'SELECT * FROM outbox WHERE $1::text IS NULL OR kind = $1 ORDER BY due_at, id',
    [kind ?? null],
  );
  return rows;
}

/** Does what the queue's job does for each message that is due by the app's clock. */
export async function sendDue(testApp: TestApp): Promise<void> {
  const now = testApp.clock.now();
  for (const { id, due_at } of await outboxOf(testApp)) {
    if (due_at <= now) await sendMessage(testApp.context, id);
  }
}

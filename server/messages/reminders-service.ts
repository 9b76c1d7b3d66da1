import { reminderDueAt } from '@shared/scheduling/reminder-time';
import type { Transaction } from '../database/client';
import { addJob } from '../jobs/job';

interface WaitingReminder {
  readonly id: string;
  readonly dedupeKey: string;
  readonly dueAt: Date;
  readonly startsAt: Date;
  readonly timeZone: string;
}

/** Sets the reminders of a site's places to come to their hour again, after the site's zone was changed. */
export async function moveReminders(tx: Transaction, siteId: string, now: Date): Promise<void> {
  const { rows } = await tx.connection.query<WaitingReminder>(
    `SELECT o.id, o.dedupe_key AS "dedupeKey", o.due_at AS "dueAt", a.starts_at AS "startsAt",
            coalesce(p.time_zone, s.time_zone) AS "timeZone"
       FROM outbox o
       JOIN appointments a ON a.id = (o.subject->>'appointmentId')::uuid
       JOIN class_dates d ON d.id = a.class_date_id
       JOIN sites s ON s.id = d.site_id
       JOIN patients p ON p.id = a.patient_id
      WHERE o.kind = 'reminder' AND o.status = 'pending' AND d.site_id = $1 AND a.starts_at > $2
      ORDER BY o.id FOR NO KEY UPDATE OF o`,
    [siteId, now],
  );
  for (const { id, dedupeKey, dueAt, startsAt, timeZone } of rows) {
    const due = reminderDueAt(startsAt, timeZone);
    if (+due === +dueAt) continue;
    await tx.connection.query('UPDATE outbox SET due_at = $2, hold_until = NULL WHERE id = $1', [
      id,
      due,
    ]);
    await addJob(tx, 'send-message', { outboxId: id }, { jobKey: dedupeKey, runAt: due });
  }
}

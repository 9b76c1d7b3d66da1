import type { AuditEvent } from '@shared/contracts/audit-contract';

const plain = (value: unknown): string =>
  typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean'
    ? String(value)
    : JSON.stringify(value);

/** What an event concerns, save the patient, and its details, in one line. */
export function detailWords({ objectType, objectId, patient, details }: AuditEvent): string {
  const object = objectId === null || objectId === patient?.id ? [] : [`${objectType} ${objectId}`];
  const facts = Object.entries(details ?? {}).map(([name, value]) => `${name}: ${plain(value)}`);
  return [...object, ...facts].join('; ');
}

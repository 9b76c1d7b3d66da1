import type { AuditEvent } from '@shared/contracts/audit-contract';
import { detailWords } from './detail-words';

const event: AuditEvent = {
  id: '01940000-0000-7000-8000-000000000001',
  at: '2026-12-01T09:00:00.000Z',
  actor: null,
  action: 'prescription.signed',
  outcome: 'success',
  objectType: 'prescription',
  objectId: 'p-1',
  patient: { id: 'x', recordNumber: 'HL-1' },
  ip: null,
  details: { status: 'active', version: 2, fields: ['phone'] },
};

describe('detailWords', () => {
  it('names the object and the details', () => {
    expect(detailWords(event)).toBe(
      'prescription p-1; status: active; version: 2; fields: ["phone"]',
    );
  });

  it('does not repeat the patient, and is empty where there is nothing', () => {
    expect(detailWords({ ...event, objectType: 'patient', objectId: 'x', details: null })).toBe('');
  });
});

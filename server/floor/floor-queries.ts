import type {
  FloorFlag,
  PatientIdentifier,
  Reading,
  Roster,
  RosterItem,
  SessionRecord,
} from '@shared/contracts/floor-contract';
import type { RangeFlag } from '@shared/clinical/range-flags';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import type { Transaction } from '../database/client';
import { restrictionsOn } from '../patients/restrictions-queries';
import { programPolicyInForce } from '../prescriptions/policy-queries';
import { floorRanges, type FloorRange } from '../prescriptions/floor-ranges-queries';
import { nextStarts } from '../progression/progression-queries';
import { RANGE_WITHDRAWN, READING_COLUMNS, type ReadingRow } from './floor-repository';

/** A reading as it is answered. */
export function presentReading({ patientId: _, ...row }: ReadingRow): Reading {
  return {
    ...row,
    symptoms: [...row.symptoms],
    measuredAt: new Date(row.measuredAt).toISOString(),
    receivedAt: new Date(row.receivedAt).toISOString(),
  };
}

const READINGS = `
  SELECT json_agg(row_to_json(w) ORDER BY w."measuredAt", w."receivedAt", w.id) AS readings
    FROM (SELECT ${READING_COLUMNS} FROM vital_signs v JOIN users u ON u.id = v.recorded_by
           WHERE v.session_record_id = r.id) w`;

interface VisitRow {
  readonly appointmentId: string;
  readonly patientId: string;
  readonly siteId: string;
  readonly displayName: string;
  readonly familyName: string;
  readonly recordNumber: string;
  readonly birthDate: string;
  readonly status: AppointmentStatus;
  readonly version: number;
  readonly monitored: boolean;
  readonly localDate: string;
  readonly arrivedAt: Date | null;
  readonly checkedInAt: Date | null;
  readonly recordId: string | null;
  readonly startedAt: Date;
  readonly identityConfirmedWith: PatientIdentifier[] | null;
  readonly beganBy: string;
  readonly signedAt: Date | null;
  readonly signedBy: string | null;
  readonly rangeId: string | null;
  readonly rangeWithdrawn: string[];
  readonly icdStatus: 'none' | 'present' | 'unknown' | null;
  readonly icdLowest: number | null;
  readonly pacemaker: boolean | null;
  readonly insulin: boolean;
  readonly readings: ReadingRow[] | null;
  readonly work: RosterItem['work'];
}

const VISITS = `
  SELECT a.id AS "appointmentId", a.patient_id AS "patientId", p.site_id AS "siteId",
         p.given_name || ' ' || p.family_name AS "displayName", p.family_name AS "familyName",
         p.record_number AS "recordNumber", p.birth_date::text AS "birthDate", a.status, a.version, a.monitored,
         a.local_date::text AS "localDate", a.arrived_at AS "arrivedAt", a.checked_in_at AS "checkedInAt",
         r.id AS "recordId", r.started_at AS "startedAt", r.identity_confirmed_with AS "identityConfirmedWith",
         began.display_name AS "beganBy", r.signed_at AS "signedAt", signer.display_name AS "signedBy",
         r.prescription_id AS "rangeId", ${RANGE_WITHDRAWN} AS "rangeWithdrawn",
         device.icd_status AS "icdStatus", device.lowest AS "icdLowest", device.pacemaker,
         EXISTS (SELECT FROM medications m
                  WHERE m.patient_id = p.id AND (m.name ILIKE '%insulin%' OR 'glucose-lowering' = ANY(m.flags))
                    AND m.entered_in_error_at IS NULL
                    AND (m.stopped_on IS NULL OR m.stopped_on > a.local_date)) AS insulin,
         vitals.readings,
         (SELECT json_build_object('setting', b.setting, 'minutes', b.minutes, 'shortBouts', b.short_bouts)
            FROM exercise_bouts b WHERE b.session_record_id = r.id
           ORDER BY b.received_at DESC, b.id DESC LIMIT 1) AS work
    FROM appointments a
    JOIN patients p ON p.id = a.patient_id
    LEFT JOIN session_records r ON r.appointment_id = a.id
    LEFT JOIN users began ON began.id = r.recorded_by
    LEFT JOIN users signer ON signer.id = r.signed_by
    LEFT JOIN LATERAL (
      SELECT d.icd_status, d.pacemaker,
             (SELECT min((zone ->> 'rate')::float) FROM jsonb_array_elements(d.icd_zones) zone) AS lowest
        FROM cardiac_devices d
       WHERE d.patient_id = p.id AND d.entered_in_error_at IS NULL
       ORDER BY d.checked_on DESC, d.recorded_at DESC LIMIT 1) device ON true
    LEFT JOIN LATERAL (${READINGS}) vitals ON true
   WHERE a.class_date_id = $1 AND a.status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')
   ORDER BY a.created_at, a.id`;

const isoOrNull = (at: Date | null): string | null => at?.toISOString() ?? null;

/** The range that a visit is read against: the record's own once there is one, else the one in force. */
interface VisitRange {
  readonly range: FloorRange | undefined;
  readonly withdrawn: readonly string[];
  /** Of the range in force now. */
  readonly flags: readonly RangeFlag[];
  readonly changed: boolean;
}

function rangeOf(row: VisitRow, ranges: readonly FloorRange[]): VisitRange {
  const active = ranges.find(({ patientId, active }) => active && patientId === row.patientId);
  const flags = active?.flags ?? [];
  if (row.recordId === null) {
    return { range: active, withdrawn: active?.withdrawn ?? [], flags, changed: false };
  }
  const range = ranges.find(({ id }) => id === row.rangeId);
  const another = active?.id !== row.rangeId;
  const withdrawnSince = row.rangeWithdrawn.length === 0 && (active?.withdrawn.length ?? 0) > 0;
  const changed = row.signedAt === null && (another || withdrawnSince);
  return { range, withdrawn: row.rangeWithdrawn, flags, changed };
}

/** The range in force, while nothing has withdrawn it. */
function leadingRangeOf({ patientId }: VisitRow, ranges: readonly FloorRange[]): string | null {
  const active = ranges.find((range) => range.active && range.patientId === patientId);
  const isWithdrawn = active?.flags.some(({ effect }) => effect === 'withdrawn') ?? true;
  return isWithdrawn ? null : (active?.id ?? null);
}

const irregular: readonly string[] = ['atrial-fibrillation', 'atrial-flutter', 'frequent-ectopy'];

function flagsOf(row: VisitRow, { range, changed }: VisitRange): FloorFlag[] {
  const flags: FloorFlag[] = [];
  if (changed) flags.push('range-changed');
  if (row.pacemaker) flags.push('pacemaker');
  if (irregular.includes(range?.rhythm ?? '')) flags.push('irregular-rhythm');
  if (row.insulin) flags.push('insulin');
  return flags;
}

function presentRange({ range, withdrawn, flags }: VisitRange) {
  const answer = range?.answer;
  const isWithdrawn = withdrawn.length > 0;
  return {
    prescriptionId: range?.id ?? null,
    leadBy: answer ? (isWithdrawn ? ('perceived-exertion' as const) : answer.leadBy) : null,
    target: isWithdrawn ? null : (answer?.target ?? null),
    guide: isWithdrawn ? null : (answer?.guide ?? null),
    ceiling: answer?.ceiling
      ? { ...answer.ceiling, bindingLimits: [...answer.ceiling.bindingLimits] }
      : null,
    askLine: isWithdrawn ? null : (answer?.askLine ?? null),
    perceivedExertion: answer?.perceivedExertion ?? null,
    pressureCeiling: answer?.pressureCeiling ?? null,
    oxygenFloor: answer?.oxygenFloor ?? null,
    restingHeartRate: range?.restingHeartRate ?? null,
    withdrawn: [...withdrawn],
    rangeFlags: [...flags],
  };
}

function presentVisit(
  row: VisitRow,
  ranges: readonly FloorRange[],
  startOf: Awaited<ReturnType<typeof nextStarts>>,
  restrictions: Awaited<ReturnType<typeof restrictionsOn>>,
): RosterItem {
  const visitRange = rangeOf(row, ranges);
  const { appointmentId, patientId, displayName, familyName, recordNumber, birthDate } = row;
  return {
    ...{ appointmentId, patientId, displayName, familyName, recordNumber, birthDate },
    status: row.status,
    version: row.version,
    monitored: row.monitored,
    arrivedAt: isoOrNull(row.arrivedAt),
    checkedInAt: isoOrNull(row.checkedInAt),
    ...presentRange(visitRange),
    icd: { status: row.icdStatus ?? 'unknown', lowestRate: row.icdLowest },
    flags: flagsOf(row, visitRange),
    restrictions: [...(restrictions.get(row.patientId) ?? [])],
    nextStart: startOf(row.patientId, leadingRangeOf(row, ranges)),
    work: row.work,
    record: row.recordId === null ? null : { id: row.recordId, ...presentRecordFacts(row) },
    readings: (row.readings ?? []).map(presentReading),
  };
}

type RecordFacts = Pick<
  VisitRow,
  'startedAt' | 'identityConfirmedWith' | 'beganBy' | 'signedAt' | 'signedBy'
>;

const presentRecordFacts = (row: RecordFacts) => ({
  startedAt: row.startedAt.toISOString(),
  identityConfirmedWith: row.identityConfirmedWith,
  recordedBy: row.beganBy,
  signedAt: isoOrNull(row.signedAt),
  signedBy: row.signedBy,
});

/**
 * The roster of a class date in the order of its places, in five statements whatever its size; null when there is no
 * such class date.
 * @param siteIds the sites whose patients the caller may see
 */
export async function classRoster(
  tx: Transaction,
  classDateId: string,
  siteIds: readonly string[],
  now: Date,
): Promise<Omit<Roster, 'at'>> {
  const { rows } = await tx.connection.query<VisitRow>({
    name: 'floor-roster',
    text: VISITS,
    values: [classDateId],
  });
  const visible = rows.filter(({ siteId }) => siteIds.includes(siteId));
  const patientIds = visible.map(({ patientId }) => patientId);
  const startOf = await nextStarts(tx, patientIds);
  const ranges = await floorRanges(
    tx,
    {
      patientIds,
      rangeIds: visible.flatMap(({ rangeId }) => rangeId ?? []),
    },
    now,
  );
  const { training } = await programPolicyInForce(tx.connection, now);
  const today = rows[0]?.localDate ?? '';
  const restrictions = await restrictionsOn(tx, patientIds, today, training.resistance);
  return {
    items: visible.map((row) => presentVisit(row, ranges, startOf, restrictions)),
    notShown: rows.length - visible.length,
  };
}

/** Counts and versions that move with every write to the visits of a class date; tells of nobody. */
export async function rosterStamp(tx: Transaction, classDateId: string): Promise<string> {
  const { rows } = await tx.connection.query<{ stamp: string }>({
    name: 'floor-roster-stamp',
    text: `
      SELECT concat_ws('.', count(*), sum(a.version), count(r.id), count(r.signed_at), sum(vitals.count),
                       extract(epoch FROM max(vitals.latest)), sum(work.count)) AS stamp
        FROM appointments a
        LEFT JOIN session_records r ON r.appointment_id = a.id
        LEFT JOIN LATERAL (
          SELECT count(*), max(v.received_at) AS latest FROM vital_signs v WHERE v.session_record_id = r.id) vitals ON true
        LEFT JOIN LATERAL (SELECT count(*) FROM exercise_bouts b WHERE b.session_record_id = r.id) work ON true
       WHERE a.class_date_id = $1`,
    values: [classDateId],
  });
  return rows[0]?.stamp ?? '';
}

type SessionRecordRow = RecordFacts &
  Pick<SessionRecord, 'id' | 'appointmentId' | 'patientId' | 'prescriptionId' | 'exercised'> & {
    readonly readings: ReadingRow[] | null;
  };

/** A session record with all its readings; undefined when there is none. */
export async function sessionRecord(
  tx: Transaction,
  id: string,
): Promise<SessionRecord | undefined> {
  const { rows } = await tx.connection.query<SessionRecordRow>({
    name: 'session-record',
    text: `
      SELECT r.id, r.appointment_id AS "appointmentId", r.patient_id AS "patientId", r.started_at AS "startedAt",
             r.identity_confirmed_with AS "identityConfirmedWith", r.prescription_id AS "prescriptionId", r.exercised,
             began.display_name AS "beganBy", r.signed_at AS "signedAt", signer.display_name AS "signedBy",
             vitals.readings
        FROM session_records r
        JOIN users began ON began.id = r.recorded_by
        LEFT JOIN users signer ON signer.id = r.signed_by
        LEFT JOIN LATERAL (${READINGS}) vitals ON true
       WHERE r.id = $1`,
    values: [id],
  });
  const [row] = rows;
  if (!row) return undefined;
  const { beganBy: _by, readings, ...facts } = row;
  return {
    ...facts,
    ...presentRecordFacts(row),
    readings: (readings ?? []).map(presentReading),
  };
}

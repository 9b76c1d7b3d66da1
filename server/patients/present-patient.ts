import type {
  Enrollment,
  Patient,
  PatientFlag,
  PatientListItem,
} from '@shared/contracts/patients-contract';
import { localDateAt } from '@shared/scheduling/wall-time';
import type { RangeState } from '../prescriptions/range-in-force-queries';
import { ageOn } from '@shared/scheduling/age';
import type { FoundPatient } from './patient-search-queries';
import type { CourseWithSite, PatientWithSite } from './patients-queries';

interface Course {
  readonly status: Enrollment['status'];
}

const nameOf = ({ givenName, familyName }: { givenName: string; familyName: string }): string =>
  `${givenName} ${familyName}`;

const isOpen = (course: Course | null): boolean =>
  course?.status === 'active' || course?.status === 'on-hold';

/** What stands out; `range` is null for callers who don't read the chart, who then see no flag of it. */
export function flagsOf(course: Course | null, range: RangeState | null): PatientFlag[] {
  const flags: [PatientFlag, boolean][] = [
    ['awaiting-physician', range?.awaitsPhysician === true],
    ['range-withdrawn', (range?.withdrawn.length ?? 0) > 0],
    ['no-range', range?.range === null && isOpen(course)],
    ['review-due', range?.reviewDue === true && isOpen(course)],
    ['on-hold', course?.status === 'on-hold'],
    ['no-course', course === null],
  ];
  return flags.flatMap(([flag, stands]) => (stands ? [flag] : []));
}

/**
 * @param range null for callers who don't read the chart
 * @param today the local date at the patient's site
 */
export function presentListItem(
  found: FoundPatient,
  range: RangeState | null,
  today: string,
): PatientListItem {
  const { course, ...patient } = found;
  return {
    ...patient,
    displayName: nameOf(found),
    ageYears: ageOn(found.birthDate, today),
    course,
    range: range?.range ?? null,
    flags: flagsOf(course, range),
  };
}

export function presentEnrollment(
  { enrollment, site, number }: CourseWithSite,
  readsChart: boolean,
): Enrollment {
  const {
    patientId: _patient,
    siteId: _site,
    qualifyingDiagnosis: diagnosis,
    qualifyingEventOn: eventOn,
    attendedInWindow: _window,
    createdAt: _made,
    ...course
  } = enrollment;
  return { ...course, number, site, qualifying: readsChart ? { diagnosis, eventOn } : null };
}

/** What the chart adds to the head of a patient's page. */
interface ChartHead {
  readonly risk: NonNullable<Patient['clinical']>['risk'];
  readonly range: RangeState;
}

/** @param chart null for callers who don't read it */
export function presentPatient(
  { patient, site, hasPassword }: PatientWithSite,
  courses: readonly CourseWithSite[],
  chart: ChartHead | null,
  now: Date,
): Patient {
  const { siteId: _site, userId, searchTerms: _terms, createdAt: _made, ...facts } = patient;
  const today = localDateAt(now, site.timeZone);
  const [current] = [...courses].sort(
    (a, b) => Number(isOpen(b.enrollment)) - Number(isOpen(a.enrollment)),
  );
  return {
    ...facts,
    displayName: nameOf(patient),
    ageYears: ageOn(patient.birthDate, today),
    site,
    today,
    account: userId === null ? 'none' : hasPassword ? 'active' : 'invited',
    enrollments: courses.map((course) => presentEnrollment(course, chart !== null)),
    clinical: chart && {
      risk: chart.risk,
      range: chart.range.range,
      withdrawn: [...chart.range.withdrawn],
      rangeFlags: [...chart.range.flags],
      flags: flagsOf(current?.enrollment ?? null, chart.range),
    },
  };
}

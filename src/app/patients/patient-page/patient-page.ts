import { ChangeDetectionStrategy, Component, computed, effect, inject, input } from '@angular/core';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import type { Patient } from '@shared/contracts/patients-contract';
import { Icon } from '../../ui/icon/icon';
import { LoadLine } from '../../ui/load-line/load-line';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { RangeFlags } from '../../ui/range-flags/range-flags';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip, type Tone } from '../../ui/state-chip/state-chip';
import { diagnosisWords, flagWords, riskWords, sexWords } from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';
import { ceilingWords, rangeWords } from '../../ui/words/range-words';
import { PatientAccess } from '../patient-access';
import { PatientChart } from '../patient-chart';
import { failureOf, valueOf } from '../../core/resource-state';

interface Part {
  readonly path: string;
  readonly label: string;
  /** Only for those who read the chart. */
  readonly chart: boolean;
}

const parts: readonly Part[] = [
  { path: 'course', label: 'Course', chart: false },
  { path: 'ranges', label: 'Prescriptions', chart: true },
  { path: 'progress', label: 'Progress', chart: true },
  { path: 'medicines', label: 'Medicines', chart: true },
  { path: 'devices', label: 'Devices and restrictions', chart: true },
  { path: 'tests', label: 'Tests and limits', chart: true },
  { path: 'resting', label: 'Resting and body', chart: true },
  { path: 'conditions', label: 'Diagnoses and conditions', chart: true },
  { path: 'questionnaires', label: 'Questionnaires', chart: true },
  { path: 'appointments', label: 'Appointments', chart: false },
  { path: 'vitals', label: 'Vitals', chart: true },
  { path: 'details', label: 'Details', chart: false },
];

/** A patient: who it is and what is in force at the head, one part of the record below. */
@Component({
  selector: 'app-patient-page',
  imports: [
    Icon,
    LoadLine,
    PageHeader,
    ProblemMessage,
    RangeFlags,
    RouterLink,
    RouterLinkActive,
    RouterOutlet,
    Skeleton,
    StateChip,
  ],
  providers: [PatientChart],
  templateUrl: './patient-page.html',
  styleUrl: './patient-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PatientPage {
  readonly #chart = inject(PatientChart);
  readonly #access = inject(PatientAccess);

  /** From the address. */
  readonly patientId = input.required<string>();

  protected readonly open = computed(() => {
    const id = this.#chart.id();
    return id === undefined ? [] : [id];
  });
  protected readonly patient = computed(() => valueOf(this.#chart.patient));
  protected readonly failure = computed(() => failureOf(this.#chart.patient));
  protected readonly parts = computed(() =>
    parts.filter(({ chart }) => !chart || this.#access.chart()),
  );
  protected readonly detail = computed(() => {
    const patient = this.patient();
    return patient ? detailOf(patient) : null;
  });
  protected readonly course = computed(() => {
    const patient = this.patient();
    return patient ? courseOf(patient) : null;
  });
  protected readonly chips = computed(() =>
    (this.patient()?.clinical?.flags ?? []).map((flag): { words: string; tone: Tone } => ({
      words: flagWords[flag],
      tone: flag === 'range-withdrawn' ? 'over' : 'due',
    })),
  );
  protected readonly rangeWords = rangeWords;
  protected readonly ceilingWords = ceilingWords;

  constructor() {
    effect(() => this.#chart.id.set(this.patientId()));
  }

  /** On a phone the parts scroll sideways: the open one is brought into view. */
  protected reveal(active: boolean, link: HTMLElement): void {
    if (active) link.scrollIntoView({ inline: 'center', block: 'nearest' });
  }

  protected tryAgain(): void {
    this.#chart.reload();
  }
}

/** "64 · Male · born May 14, 1961 · HL-2041 · Quayside" */
function detailOf({ ageYears, sexAtBirth, birthDate, recordNumber, site }: Patient): string {
  const sex = sexAtBirth === 'unknown' ? 'Sex not known' : sexWords[sexAtBirth];
  const born = `born ${formatLocalDate(birthDate)}`;
  return [`${ageYears}`, sex, born, recordNumber, site.name].join(' · ');
}

/** "Course 1, session 9 of 36 · Stent, Sep 3, 2026 · Moderate risk" */
function courseOf({ enrollments, clinical }: Patient): string {
  const course =
    enrollments.find(({ status }) => status === 'active' || status === 'on-hold') ?? enrollments[0];
  if (!course) return 'No course yet';
  const { number, attended, plannedSessions, qualifying } = course;
  return [
    `Course ${number}, session ${attended} of ${plannedSessions}`,
    qualifying && `${diagnosisWords[qualifying.diagnosis]}, ${formatLocalDate(qualifying.eventOn)}`,
    clinical && (clinical.risk ? riskWords[clinical.risk.level] : riskWords.unknown),
  ]
    .filter(Boolean)
    .join(' · ');
}

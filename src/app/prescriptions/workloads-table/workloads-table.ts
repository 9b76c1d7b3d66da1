import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import {
  equationSource,
  type Gait,
  gaits,
  handrailNote,
  type EquationModality,
} from '@shared/clinical/gait';
import type {
  Modality,
  PrescriptionAnswer,
  Workload,
  WorkloadPoint,
} from '@shared/clinical/prescribing/answer';
import type { PrescriptionPolicy } from '@shared/clinical/prescribing/policy';
import { type RunWorkload, runWorkloads } from '@shared/clinical/run-workloads';
import { modalityWords, rangeText, settingText } from '../../ui/words/prescription-words';
import { boutWords } from './bout-words';
import { stepsText, validatedText } from './equation-words';

interface MachineRow {
  readonly machine: string;
  readonly start: string | null;
  readonly limit: string | null;
  readonly why: string | null;
  readonly validated: string;
}

interface Setting {
  readonly point: WorkloadPoint;
  readonly why: string | null;
  readonly text: string | null;
}

const gaitWords: Readonly<Record<Gait, string>> = { walk: 'Walks', run: 'Runs' };

function rowOf(machine: string, settings: readonly Setting[], validated: string): MachineRow {
  const at = (point: WorkloadPoint) => settings.find((one) => one.point === point);
  const [start, limit] = [at('start'), at('limit')];
  return {
    machine,
    start: start?.text ?? null,
    limit: limit?.text ?? null,
    why: start?.why ?? limit?.why ?? null,
    validated,
  };
}

const validatedOf = (modality: Modality): string =>
  modality === 'stepper'
    ? 'Set by the METs that the machine shows; no equation.'
    : validatedText(modality satisfies EquationModality);

/** A row a machine, with what it is set to at the low and at the high end. */
function machinesOf(workloads: readonly Workload[]): MachineRow[] {
  const modalities = [...new Set(workloads.map(({ modality }) => modality))];
  return modalities.map((modality) => {
    const settings = workloads
      .filter((one) => one.modality === modality)
      .map((one) => ({ point: one.point, why: one.why, text: settingText(one) }));
    return rowOf(modalityWords[modality], settings, validatedOf(modality));
  });
}

const runRow = (runs: readonly RunWorkload[]): MachineRow =>
  rowOf(
    'Treadmill, running',
    runs.map(({ point, why, speedMph }) => ({
      point,
      why,
      text: speedMph === null ? null : `${speedMph.toFixed(1)} mph, level`,
    })),
    validatedText('treadmill-run'),
  );

/** What each machine is set to at the low and at the high end of the work, or why it has no setting. */
@Component({
  selector: 'app-workloads-table',
  templateUrl: './workloads-table.html',
  styleUrl: './workloads-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkloadsTable {
  readonly answer = input.required<PrescriptionAnswer>();
  /** The policy in force: of its equipment run speeds are made, where the range is of that version too. */
  readonly policy = input.required<PrescriptionPolicy>();

  protected readonly rangeText = rangeText;
  protected readonly gaits = gaits;
  protected readonly gaitWords = gaitWords;
  protected readonly handrailNote = handrailNote;
  protected readonly equationSource = equationSource;
  /** As it is seen on the treadmill; kept nowhere. */
  protected readonly gait = signal<Gait>('walk');
  readonly #isOfPolicy = computed(() => this.answer().policyVersion === this.policy().version);
  protected readonly mayRun = computed(
    () =>
      this.#isOfPolicy() &&
      this.answer().targetMets !== null &&
      this.answer().workloads.some(({ modality }) => modality === 'treadmill-walk'),
  );
  protected readonly bouts = computed(() => boutWords(this.answer()));
  protected readonly steps = computed(() => (this.#isOfPolicy() ? stepsText(this.policy()) : null));
  protected readonly machines = computed(() => {
    const { workloads, targetMets } = this.answer();
    if (this.gait() === 'walk' || !this.mayRun()) return machinesOf(workloads);
    const others = workloads.filter(({ modality }) => modality !== 'treadmill-walk');
    return [runRow(runWorkloads(targetMets, this.policy().equipment)), ...machinesOf(others)];
  });
  protected readonly arms = computed(
    () =>
      this.answer()
        .workloads.map((one) => (one.modality === 'arm' ? one.target : null))
        .find((target) => target !== null) ?? null,
  );
}

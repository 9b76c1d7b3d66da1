import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { PrescriptionAnswer, Workload } from '@shared/clinical/prescribing/answer';
import { modalityWords, rangeText, settingText } from '../../ui/words/prescription-words';

interface MachineRow {
  readonly machine: string;
  readonly start: string | null;
  readonly limit: string | null;
  readonly why: string | null;
}

/** A row a machine, with what it is set to at the low and at the high end. */
function machinesOf(workloads: readonly Workload[]): MachineRow[] {
  const modalities = [...new Set(workloads.map(({ modality }) => modality))];
  return modalities.map((modality) => {
    const at = (point: Workload['point']) =>
      workloads.find((one) => one.modality === modality && one.point === point);
    const [start, limit] = [at('start'), at('limit')];
    return {
      machine: modalityWords[modality],
      start: start ? settingText(start) : null,
      limit: limit ? settingText(limit) : null,
      why: start?.why ?? limit?.why ?? null,
    };
  });
}

/** What each machine is set to at the low and at the high end of the work, or why it has no setting. */
@Component({
  selector: 'app-workloads-table',
  templateUrl: './workloads-table.html',
  styleUrl: './workloads-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkloadsTable {
  readonly answer = input.required<PrescriptionAnswer>();

  protected readonly rangeText = rangeText;
  protected readonly machines = computed(() => machinesOf(this.answer().workloads));
  protected readonly arms = computed(
    () =>
      this.answer()
        .workloads.map((one) => (one.modality === 'arm' ? one.target : null))
        .find((target) => target !== null) ?? null,
  );
}

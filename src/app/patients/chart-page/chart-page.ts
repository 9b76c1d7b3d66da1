import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { ConditionsSection } from '../conditions-section/conditions-section';
import { MedicationReview } from '../medication-review/medication-review';
import { PatientChart } from '../patient-chart';
import { failureOf, valueOf } from '../../core/resource-state';
import { RecordSection } from '../record-section/record-section';
import type { ListedKind } from '../record-section/section-words';

/** A part of the chart: the sections that its route names, one below the other. */
@Component({
  selector: 'app-chart-page',
  imports: [ConditionsSection, MedicationReview, ProblemMessage, RecordSection, Skeleton],
  template: `
    @if (failure(); as problem) {
      <app-problem-message [problem]="problem" />
    }
    @let record = shown();
    @let patient = chartPatient();
    @if (record && patient) {
      @if (withConditions()) {
        <app-conditions-section
          [record]="record"
          [today]="patient.today"
          [timeZone]="patient.site.timeZone"
        />
      }
      @for (kind of kinds(); track kind) {
        <app-record-section
          [kind]="kind"
          [record]="record"
          [today]="patient.today"
          [timeZone]="patient.site.timeZone"
          [patient]="patient"
        >
          @if (kind === 'medications') {
            <app-medication-review [record]="record" [timeZone]="patient.site.timeZone" />
          }
        </app-record-section>
      }
    } @else if (!failure()) {
      <div class="panel"><app-skeleton [lines]="6" /></div>
    }
  `,
  styles: ':host { display: grid; gap: 1rem; }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChartPage {
  readonly #chart = inject(PatientChart);

  /** The sections, in their order; from the route. */
  readonly kinds = input.required<readonly ListedKind[]>();
  readonly withConditions = input(false);

  protected readonly shown = computed(() => valueOf(this.#chart.record));
  protected readonly chartPatient = computed(() => valueOf(this.#chart.patient));
  protected readonly failure = computed(() => failureOf(this.#chart.record));
}

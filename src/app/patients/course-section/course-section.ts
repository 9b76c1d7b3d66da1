import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  type ChangeEnrollmentRequest,
  type Enrollment,
  type OpenEnrollmentRequest,
  changeEnrollmentRequestSchema,
  openEnrollmentRequestSchema,
} from '@shared/contracts/patients-contract';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Fact } from '../../ui/fact/fact';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { StateChip } from '../../ui/state-chip/state-chip';
import { diagnosisWords, enrollmentStatusWords } from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';
import { askAgain, buildGroup, readGroup } from '../entry-editor/entry-group';
import { EntryField } from '../entry-field/entry-field';
import { PatientAccess } from '../patient-access';
import { PatientChart } from '../patient-chart';
import { PatientsClient } from '../patients-client';
import { valueOf } from '../../core/resource-state';
import { courseFields, courseRules, courseStart } from './course-form';

const endings = changeEnrollmentRequestSchema.shape;

/** The courses: how far, who pays; opening, holding and ending them. */
@Component({
  selector: 'app-course-section',
  imports: [
    EmptyState,
    EntryField,
    Fact,
    FieldError,
    Icon,
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
    StateChip,
  ],
  templateUrl: './course-section.html',
  styleUrl: './course-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CourseSection {
  readonly #client = inject(PatientsClient);
  readonly #chart = inject(PatientChart);
  readonly #notices = inject(Notices);
  protected readonly access = inject(PatientAccess);

  protected readonly patient = computed(() => valueOf(this.#chart.patient));
  readonly #sites = this.#client.sites();
  protected readonly fields = computed(() => courseFields(valueOf(this.#sites) ?? []));
  protected readonly context = computed(() => ({ today: this.patient()?.today ?? '', units: {} }));
  protected readonly runs = computed(() => this.patient()?.enrollments.some(isOpen) ?? false);

  protected readonly opening = signal<FormGroup | null>(null);
  /** The course whose end is asked for. */
  protected readonly ending = signal<string | null>(null);
  protected readonly end = new FormGroup({
    status: new FormControl<'completed' | 'discontinued'>('completed', { nonNullable: true }),
    closedOn: new FormControl('', {
      nonNullable: true,
      validators: zodValidator(endings.closedOn.unwrap()),
    }),
    closedReason: new FormControl('', {
      nonNullable: true,
      validators: zodValidator(endings.closedReason.unwrap()),
    }),
  });
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly diagnosisWords = diagnosisWords;
  protected readonly statusWords = enrollmentStatusWords;
  protected readonly date = formatLocalDate;
  protected readonly isOpen = isOpen;

  protected startOpening(siteId: string): void {
    this.problem.set(null);
    this.opening.set(buildGroup(this.fields(), courseRules, courseStart(siteId), this.context()));
  }

  protected async open(id: string): Promise<void> {
    const group = this.opening();
    if (group === null) return;
    askAgain(group);
    const request = readGroup(this.fields(), group) as OpenEnrollmentRequest;
    if (group.valid) {
      const { error } = openEnrollmentRequestSchema.safeParse(request);
      const faults = error?.issues ?? [];
      showFieldErrors(
        group,
        faults.map(({ path, message }) => ({ path: path.join('.'), message })),
      );
    }
    group.markAllAsTouched();
    if (group.invalid) return;
    await this.#try(group, 'The course is open.', () =>
      firstValueFrom(this.#client.openEnrollment(id, request)),
    );
    if (this.problem() === null && group.valid) this.opening.set(null);
  }

  protected async hold(id: string, course: Enrollment): Promise<void> {
    const status = course.status === 'on-hold' ? 'active' : 'on-hold';
    const said = status === 'active' ? 'The course goes on.' : 'The course is on hold.';
    await this.#change(id, course, { status, version: course.version }, said, null);
  }

  protected startEnding(course: Enrollment): void {
    this.problem.set(null);
    this.end.reset({
      status: course.attended >= course.plannedSessions ? 'completed' : 'discontinued',
      closedOn: this.patient()?.today ?? '',
      closedReason: '',
    });
    this.ending.set(course.id);
  }

  protected async finish(id: string, course: Enrollment): Promise<void> {
    askAgain(this.end);
    this.end.markAllAsTouched();
    if (this.end.invalid) return;
    const request = { ...this.end.getRawValue(), version: course.version };
    await this.#change(id, course, request, 'The course has ended.', this.end);
    if (this.problem() === null && this.end.valid) this.ending.set(null);
  }

  #change(
    id: string,
    course: Enrollment,
    request: ChangeEnrollmentRequest,
    said: string,
    group: FormGroup | null,
  ): Promise<void> {
    return this.#try(group, said, () =>
      firstValueFrom(this.#client.changeEnrollment(id, course.id, request)),
    );
  }

  async #try(group: FormGroup | null, said: string, work: () => Promise<unknown>): Promise<void> {
    if (this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      await work();
      this.#chart.reload();
      await this.#notices.say(said);
    } catch (error) {
      const problem = toProblem(error);
      const rest = group ? showFieldErrors(group, problem.errors) : problem.errors;
      if (rest.length > 0 || problem.errors.length === 0) this.problem.set(problem);
    } finally {
      this.sending.set(false);
    }
  }
}

function isOpen({ status }: Enrollment): boolean {
  return status === 'active' || status === 'on-hold';
}

import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton, MatIconButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  type RecordEntry,
  retireThresholdRequestSchema,
  stopMedicationRequestSchema,
} from '@shared/contracts/record-contract';
import { ComputedLines } from '../computed-lines/computed-lines';
import type { Line } from '../entry-editor/entry-form';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { Icon } from '../../ui/icon/icon';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatDay, formatLocalDate } from '../../ui/words/dates';
import { PatientAccess } from '../patient-access';
import { entryWords } from './entry-words';
import type { ListedKind } from './section-words';

/** What is asked before an action: a stop's date, a reason, or no more than yes. */
type Asked = 'in-error' | 'stop' | 'retire' | 'supersede' | 'lift' | 'close';

/** A later test that may take a limit's place. */
export interface CleanTest {
  readonly id: string;
  readonly performedOn: string;
  readonly peakHeartRate: number;
}

interface Question {
  readonly label: string;
  readonly button: string;
}

/** What asks for words, and the button that says them. */
const asksForWords: Readonly<Partial<Record<Asked, Question>>> = {
  retire: { label: 'Why it no longer binds', button: 'Retire the limit' },
  lift: { label: 'Who lifted it, and why', button: 'Lift the order' },
  close: { label: 'What was done, and with whom', button: 'Close the follow-up' },
};

const buttons: Readonly<Partial<Record<Asked, string>>> = {
  stop: 'Stop the drug',
  supersede: 'It no longer binds',
  'in-error': 'Mark as entered in error',
};

const endWords = {
  retired: 'Retired',
  superseded: 'Superseded',
  lifted: 'Lifted',
  closed: 'Followed up',
} as const;

/** One entry: what, of when, by whom, and what may be done with it. */
@Component({
  selector: 'app-entry-row',
  imports: [
    ComputedLines,
    FieldError,
    Icon,
    MatButton,
    MatError,
    MatFormField,
    MatIconButton,
    MatInput,
    MatLabel,
    ReactiveFormsModule,
    StateChip,
  ],
  templateUrl: './entry-row.html',
  styleUrl: './entry-row.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntryRow {
  readonly #element = inject<ElementRef<HTMLElement>>(ElementRef);
  readonly #injector = inject(Injector);
  protected readonly access = inject(PatientAccess);

  readonly kind = input.required<ListedKind>();
  readonly entry = input.required<RecordEntry>();
  readonly today = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly changed = output();
  readonly inError = output();
  readonly stopped = output<string>();
  readonly retired = output<string>();
  readonly superseded = output<string>();
  readonly lifted = output<string>();
  /** A follow-up, with what was done. */
  readonly closed = output<string>();
  /** What is computed from the entry. */
  readonly lines = input<readonly Line[]>([]);
  /** A later clean test, where there is one. */
  readonly clean = input<CleanTest | null>(null);

  /** Whether the actions are shown. */
  protected readonly open = signal(false);
  protected readonly asked = signal<Asked | null>(null);
  protected readonly stoppedOn = new FormControl('', {
    nonNullable: true,
    validators: zodValidator(stopMedicationRequestSchema.shape.stoppedOn),
  });
  protected readonly reason = new FormControl('', {
    nonNullable: true,
    validators: zodValidator(retireThresholdRequestSchema.shape.reason),
  });

  protected readonly words = computed(() => entryWords(this.kind(), this.entry().values as never));
  protected readonly isWrong = computed(() => this.entry().enteredInErrorAt !== null);
  protected readonly isStopped = computed(() =>
    Boolean((this.entry().values as { stoppedOn?: string | null }).stoppedOn),
  );
  protected readonly binds = computed(
    () => this.kind() === 'thresholds' && this.entry().ended === null && !this.isWrong(),
  );
  protected readonly question = computed(() => {
    const asked = this.asked();
    return (asked && asksForWords[asked]) ?? null;
  });
  protected readonly button = computed(
    () => this.question()?.button ?? buttons[this.asked() ?? 'in-error'] ?? '',
  );
  protected readonly holds = computed(() => {
    const { until } = this.entry().values as { until?: string | null };
    const open = this.kind() === 'restrictions' && this.entry().ended === null && !this.isWrong();
    return open && (!until || until >= this.today());
  });
  protected readonly waits = computed(() => {
    const { instrument, answers } = this.entry().values as Partial<
      RecordEntry<'questionnaires'>['values']
    >;
    const told = instrument === 'phq-9' && Number(answers?.[8] ?? 0) > 0;
    return told && this.entry().ended === null && !this.isWrong();
  });
  protected readonly endWords = endWords;
  protected readonly localDay = formatLocalDate;

  protected readonly mayChange = computed(
    () => this.binds() || (this.kind() === 'medications' && !this.isStopped()),
  );
  protected readonly source = computed(() => {
    const { recordedAt, recordedBy } = this.entry();
    const { date } = this.words();
    const recordedOn = formatDay(recordedAt, this.timeZone());
    const by = `entered by ${recordedBy.displayName}`;
    if (date === null) return `${recordedOn} · ${by}`;
    const dated = formatLocalDate(date);
    return dated === recordedOn ? `${dated} · ${by}` : `${dated} · ${by} on ${recordedOn}`;
  });
  protected readonly day = (instant: string) => formatDay(instant, this.timeZone());

  protected toggle(): void {
    this.asked.set(null);
    this.open.update((open) => !open);
  }

  protected startChange(): void {
    this.open.set(false);
    this.changed.emit();
  }

  /** Leaves everything as it is, with the focus where it was opened. */
  protected keep(): void {
    this.asked.set(null);
    this.open.set(false);
    this.#element.nativeElement.querySelector<HTMLElement>('[aria-expanded]')?.focus();
  }

  protected ask(what: Asked): void {
    this.stoppedOn.reset(this.today());
    this.reason.reset('');
    this.asked.set(what);
    afterNextRender(
      () =>
        this.#element.nativeElement
          .querySelector<HTMLElement>('.asked :is(input, button)')
          ?.focus(),
      { injector: this.#injector },
    );
  }

  protected answer(): void {
    const asked = this.asked();
    const control = asked === 'stop' ? this.stoppedOn : this.question() ? this.reason : null;
    control?.markAsTouched();
    if (control?.invalid) return;
    this.asked.set(null);
    this.open.set(false);
    this.#tell(asked);
  }

  #tell(asked: Asked | null): void {
    const words = this.reason.value;
    if (asked === 'stop') this.stopped.emit(this.stoppedOn.value);
    else if (asked === 'retire') this.retired.emit(words);
    else if (asked === 'lift') this.lifted.emit(words);
    else if (asked === 'close') this.closed.emit(words);
    else if (asked === 'supersede') this.superseded.emit(this.clean()?.id ?? '');
    else this.inError.emit();
  }
}

import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import type { ClassAppointment } from '@shared/contracts/schedule-contract';
import { StateChip } from '../../ui/state-chip/state-chip';
import { statusInWords } from '../class-words';

/** What a member of staff does with one place. */
export interface RosterAction {
  readonly appointment: ClassAppointment;
  readonly status: 'arrived' | 'noshow' | 'cancelled' | 'booked';
  readonly reason?: string;
}

/** One patient of a class date, with what may be done with the place. */
@Component({
  selector: 'app-roster-row',
  imports: [MatButton, MatFormField, MatInput, MatLabel, ReactiveFormsModule, StateChip],
  templateUrl: './roster-row.html',
  styleUrl: './roster-row.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RosterRow {
  readonly appointment = input.required<ClassAppointment>();
  /** Whether the person may change places at all. */
  readonly editable = input.required<boolean>();
  /** Whether the class has begun: before that nobody is a no-show. */
  readonly begun = input.required<boolean>();
  /** Whether marks may still be taken back: until the class's day ends. */
  readonly undoable = input.required<boolean>();
  readonly busy = input(false);
  readonly acted = output<RosterAction>();

  protected readonly cancelling = signal(false);
  protected readonly reason = new FormControl('', { nonNullable: true });
  protected readonly state = computed(() => statusInWords(this.appointment().status));
  protected readonly marked = computed(() =>
    ['arrived', 'noshow'].includes(this.appointment().status),
  );

  protected act(status: RosterAction['status']): void {
    this.acted.emit({ appointment: this.appointment(), status });
  }

  protected cancel(): void {
    const reason = this.reason.value.trim();
    this.cancelling.set(false);
    this.acted.emit({
      appointment: this.appointment(),
      status: 'cancelled',
      ...(reason !== '' && { reason }),
    });
  }
}

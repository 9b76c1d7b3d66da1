import { ChangeDetectionStrategy, Component, inject, input, output, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import type { PatientListItem } from '@shared/contracts/patients-contract';
import { catchError, debounceTime, distinctUntilChanged, from, map, of, switchMap } from 'rxjs';
import { type Problem, toProblem } from '../../core/problem';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { dateInWords } from '../../ui/site-time/site-time';
import { ScheduleClient } from '../schedule-client';

interface Found {
  readonly words: string;
  readonly people: readonly PatientListItem[];
  readonly problem: Problem | null;
}

const nothing: Found = { words: '', people: [], problem: null };

/** Finds a patient while one types, by name or record number; two identifiers stand beside each. */
@Component({
  selector: 'app-patient-search',
  imports: [MatFormField, MatHint, MatInput, MatLabel, ProblemMessage, ReactiveFormsModule],
  templateUrl: './patient-search.html',
  styleUrl: './patient-search.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PatientSearch {
  readonly #client = inject(ScheduleClient);

  readonly label = input('Find a patient');
  readonly chosen = output<PatientListItem>();

  protected readonly words = new FormControl('', { nonNullable: true });
  protected readonly found = signal(nothing);

  constructor() {
    this.words.valueChanges
      .pipe(
        map((words) => words.trim()),
        debounceTime(250),
        distinctUntilChanged(),
        switchMap((words) => (words === '' ? of(nothing) : from(this.#search(words)))),
        takeUntilDestroyed(),
      )
      .subscribe((found) => this.found.set(found));
  }

  protected birthDate({ birthDate }: PatientListItem): string {
    return dateInWords(birthDate, 'full');
  }

  protected choose(person: PatientListItem): void {
    this.words.setValue('');
    this.found.set(nothing);
    this.chosen.emit(person);
  }

  #search(words: string) {
    return from(this.#client.searchPatients({ q: words, limit: 8 })).pipe(
      map((people): Found => ({ words, people, problem: null })),
      catchError((error: unknown) => of({ words, people: [], problem: toProblem(error) })),
    );
  }
}

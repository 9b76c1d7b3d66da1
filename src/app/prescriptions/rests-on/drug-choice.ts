import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { rateActingDrugs } from '@shared/clinical/prescribing';
import { rateActingWords } from '../../ui/words/clinical-words';
import { WorksheetState } from '../worksheet/worksheet-state';

/** Which drugs that act on the heart rate are taken; not known is an answer, and counts as taking one. */
@Component({
  selector: 'app-drug-choice',
  template: `
    <fieldset>
      <legend class="visually-hidden">Rate-acting drugs</legend>
      <label>
        <input type="checkbox" [checked]="taken() === null" (change)="toggleUnknown()" />
        Not known (counts as taking one)
      </label>
      @for (drug of drugs; track drug) {
        <label>
          <input
            type="checkbox"
            [checked]="taken()?.includes(drug) ?? false"
            (change)="toggle(drug)"
          />
          {{ words[drug] }}
        </label>
      }
    </fieldset>
  `,
  styleUrl: './drug-choice.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DrugChoice {
  readonly #state = inject(WorksheetState);
  readonly #control = this.#state.form.controls.rateActingDrugs;
  protected readonly drugs = rateActingDrugs;
  protected readonly words = rateActingWords;
  protected readonly taken = computed(
    () => (this.#state.value() as { rateActingDrugs: readonly string[] | null }).rateActingDrugs,
  );

  protected toggleUnknown(): void {
    this.#control.setValue(this.taken() === null ? [] : null);
  }

  protected toggle(drug: string): void {
    const taken = this.taken() ?? [];
    const without = taken.filter((one) => one !== drug);
    this.#control.setValue(without.length < taken.length ? without : [...taken, drug]);
  }
}

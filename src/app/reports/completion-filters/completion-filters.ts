import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatOption, MatSelect } from '@angular/material/select';
import type { Site } from '@shared/contracts/sites-contract';
import {
  ageChoices,
  diagnosisChoices,
  groupingChoices,
  sexChoices,
  type Choice,
  type CompletionChoices,
} from '../completion-query';

interface Filter {
  readonly key: 'siteId' | 'sex' | 'ageBand' | 'diagnosis';
  readonly label: string;
  readonly all: string;
  readonly choices: readonly Choice[];
}

/** Which courses are counted and how they are grouped. */
@Component({
  selector: 'app-completion-filters',
  imports: [MatFormField, MatInput, MatLabel, MatOption, MatSelect],
  templateUrl: './completion-filters.html',
  styleUrl: './completion-filters.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CompletionFilters {
  readonly choices = input.required<CompletionChoices>();
  readonly sites = input<readonly Site[]>([]);
  readonly chosen = output<Partial<CompletionChoices>>();
  protected readonly groupings = groupingChoices;
  protected readonly filters = computed<Filter[]>(() => [
    {
      key: 'siteId',
      label: 'Site',
      all: 'All my sites',
      choices: this.sites().map(({ id, name }) => ({ value: id, label: name })),
    },
    { key: 'diagnosis', label: 'Diagnosis', all: 'Every diagnosis', choices: diagnosisChoices },
    { key: 'sex', label: 'Sex', all: 'Everyone', choices: sexChoices },
    { key: 'ageBand', label: 'Age at first session', all: 'Every age', choices: ageChoices },
  ]);

  protected choose(key: Filter['key'], value: string): void {
    this.chosen.emit({ [key]: value });
  }

  protected day(key: 'from' | 'to', event: Event): void {
    const { value } = event.target as HTMLInputElement;
    if (value !== '') this.chosen.emit({ [key]: value });
  }
}

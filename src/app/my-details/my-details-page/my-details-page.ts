import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatCheckbox, type MatCheckboxChange } from '@angular/material/checkbox';
import { MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import type { Patient } from '@shared/contracts/patients-contract';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { Session } from '../../core/session';
import { Fact } from '../../ui/fact/fact';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { MyDetailsClient } from '../my-details-client';

const usual = [
  'America/New_York',
  'America/Chicago',
  'America/Denver',
  'America/Phoenix',
  'America/Los_Angeles',
  'America/Anchorage',
  'Pacific/Honolulu',
];

/** "Chicago" for America/Chicago. */
const placeOf = (zone: string): string => zoneWords(zone).replace(/ \(.*$/, '');

/** "Chicago (America)" for America/Chicago. */
function zoneWords(zone: string): string {
  const parts = zone.replaceAll('_', ' ').split('/');
  const place = parts.pop() ?? zone;
  return parts.length > 0 ? `${place} (${parts.join(', ')})` : place;
}

const option = (value: string) => ({ value, label: zoneWords(value) });

/** A patient's own details: what the program holds, and the clock that times are shown and reminders sent by. */
@Component({
  selector: 'app-my-details-page',
  imports: [
    Fact,
    MatCheckbox,
    MatFormField,
    MatInput,
    MatLabel,
    PageHeader,
    ProblemMessage,
    RouterLink,
    Skeleton,
  ],
  templateUrl: './my-details-page.html',
  styleUrl: './my-details-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MyDetailsPage {
  readonly #client = inject(MyDetailsClient);
  readonly #notices = inject(Notices);
  readonly #session = inject(Session);

  readonly #id = computed(() => this.#session.user()?.patientId ?? undefined);
  readonly #resource = this.#client.details(this.#id);
  readonly #preferences = this.#client.preferences(this.#id);
  protected readonly patient = computed(() => valueOf(this.#resource));
  protected readonly hasRecord = computed(() => Boolean(this.#session.user()?.patientId));
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(
    () => this.#refused() ?? failureOf(this.#resource) ?? failureOf(this.#preferences),
  );
  protected readonly reminders = computed(() => valueOf(this.#preferences)?.reminders);

  protected readonly usualZones = usual.map(option);
  protected readonly otherZones = Intl.supportedValuesOf('timeZone')
    .filter((zone) => !usual.includes(zone))
    .map(option)
    .sort((a, b) => a.label.localeCompare(b.label));
  protected readonly placeOf = placeOf;

  protected async remind({ checked: reminders, source }: MatCheckboxChange): Promise<void> {
    this.#refused.set(null);
    try {
      await firstValueFrom(this.#client.changePreferences({ reminders }));
      await this.#notices.say(
        reminders ? 'Saved. We will remind you.' : 'Saved. We send no more reminders.',
      );
    } catch (error) {
      source.checked = !reminders;
      this.#refused.set(toProblem(error));
    }
    this.#preferences.reload();
  }

  protected async choose({ id, version }: Patient, zone: string): Promise<void> {
    this.#refused.set(null);
    try {
      const timeZone = zone === '' ? null : zone;
      await firstValueFrom(this.#client.changeTimeZone(id, version, timeZone));
      await this.#notices.say('Saved. Times now follow this clock.');
    } catch (error) {
      this.#refused.set(toProblem(error));
    }
    this.#resource.reload();
  }
}

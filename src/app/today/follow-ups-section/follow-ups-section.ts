import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { failureOf, valueOf } from '../../core/resource-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { formatDay, formatLocalDate } from '../../ui/words/dates';
import { TodayClient } from '../today-client';

/** Who told of thoughts of self-harm, until a named person has written what was done; nothing is shown while nobody waits. */
@Component({
  selector: 'app-follow-ups-section',
  imports: [Icon, MatButton, ProblemMessage, RouterLink],
  template: `
    @if (failure(); as problem) {
      <app-problem-message [problem]="problem">
        <button matButton="outlined" type="button" (click)="reload()">Try again</button>
      </app-problem-message>
    }
    @if (items().length > 0) {
      <section class="panel" aria-labelledby="follow-ups">
        <h2 id="follow-ups">
          <app-icon name="priority-high" /> Speak with them today
          <span class="total num">{{ items().length }}</span>
        </h2>
        <p class="muted">
          Each answered the PHQ-9’s question about being better off dead or of self-harm above zero.
          Follow the program’s policy; in danger call emergency services, or 988 in the U.S.
        </p>
        <ul>
          @for (item of items(); track item.id) {
            <li>
              <div>
                <a class="name" [routerLink]="['/patients', item.patient.id]">{{
                  item.patient.displayName
                }}</a>
                <span class="muted num">{{ item.detail }}</span>
              </div>
              <a
                matButton="outlined"
                [routerLink]="['/patients', item.patient.id, 'questionnaires']"
                [attr.aria-label]="'Write what was done: ' + item.patient.displayName"
                >Write what was done</a
              >
            </li>
          }
        </ul>
      </section>
    }
  `,
  styleUrls: ['../tasks-section/tasks-section.scss', './follow-ups-section.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FollowUpsSection {
  readonly #resource = inject(TodayClient).followUps();

  protected readonly failure = computed(() => failureOf(this.#resource));
  protected readonly items = computed(() =>
    (valueOf(this.#resource) ?? []).map(({ id, patient, answeredOn, recordedAt, recordedBy }) => ({
      id,
      patient,
      detail: [
        patient.recordNumber,
        patient.site.name,
        ...(patient.phone === null ? [] : [patient.phone]),
        `answered ${formatLocalDate(answeredOn)}`,
        `entered by ${recordedBy}, ${formatDay(recordedAt, patient.site.timeZone)}`,
      ].join(' · '),
    })),
  );

  protected reload(): void {
    this.#resource.reload();
  }
}

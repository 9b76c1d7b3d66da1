import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { Session } from '../../core/session';
import { PageHeader } from '../../ui/page-header/page-header';
import { AwaitingSection } from '../awaiting-section/awaiting-section';
import { DeskSection } from '../desk-section/desk-section';
import { FollowUpsSection } from '../follow-ups-section/follow-ups-section';
import { TasksSection } from '../tasks-section/tasks-section';

/** What waits for the person today: signatures for a physician, who comes for the front desk, ranges to see to for the others. */
@Component({
  selector: 'app-today-page',
  imports: [AwaitingSection, DeskSection, FollowUpsSection, PageHeader, TasksSection],
  template: `
    <app-page-header heading="Today" />
    @if (signs() || prescribes()) {
      <app-follow-ups-section />
    }
    @if (signs()) {
      <app-awaiting-section />
    }
    @if (prescribes()) {
      <app-tasks-section />
    }
    @if (atDesk()) {
      <app-desk-section />
    }
  `,
  styleUrl: './today-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TodayPage {
  readonly #roles = inject(Session).roles;
  protected readonly signs = computed(() => this.#roles().includes('physician'));
  protected readonly atDesk = computed(() => this.#roles().includes('front-desk'));
  protected readonly prescribes = computed(() =>
    this.#roles().some((role) => role === 'exercise-physiologist' || role === 'nurse'),
  );
}

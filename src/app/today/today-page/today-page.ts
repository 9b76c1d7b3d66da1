import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { Session } from '../../core/session';
import { PageHeader } from '../../ui/page-header/page-header';
import { AwaitingSection } from '../awaiting-section/awaiting-section';
import { TasksSection } from '../tasks-section/tasks-section';

/** What waits for the person today: signatures for a physician, ranges to see to for the others. */
@Component({
  selector: 'app-today-page',
  imports: [AwaitingSection, PageHeader, TasksSection],
  template: `
    <app-page-header heading="Today" />
    @if (signs()) {
      <app-awaiting-section />
    }
    @if (prescribes()) {
      <app-tasks-section />
    }
  `,
  styleUrl: './today-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TodayPage {
  readonly #roles = inject(Session).roles;
  protected readonly signs = computed(() => this.#roles().includes('physician'));
  protected readonly prescribes = computed(() =>
    this.#roles().some((role) => role === 'exercise-physiologist' || role === 'nurse'),
  );
}

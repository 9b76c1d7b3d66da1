import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  signal,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { User, UserChange } from '@shared/contracts/accounts-contract';
import { type Observable, firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { Session } from '../../core/session';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { accountStates } from '../account-state';
import { type PersonControls, personControls } from '../person-form/person-controls';
import { PersonForm } from '../person-form/person-form';
import { SettingsClient } from '../settings-client';
import { changeOf } from './change-of';

/** One account: what it may do, and whether it may sign in. */
@Component({
  selector: 'app-person-page',
  imports: [
    MatButton,
    PageHeader,
    PersonForm,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    Skeleton,
    StateChip,
  ],
  templateUrl: './person-page.html',
  styleUrl: '../settings-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PersonPage {
  readonly #client = inject(SettingsClient);
  readonly #notices = inject(Notices);
  readonly #session = inject(Session);
  /** From the route. */
  readonly id = input.required<string>();

  readonly #read = this.#client.user(this.id);
  readonly #sites = this.#client.sites();
  /** As read, and then as each change was answered. */
  protected readonly user = linkedSignal<User | undefined>(() => valueOf(this.#read));
  protected readonly sites = computed(() => valueOf(this.#sites) ?? []);
  /** Made once of what was read, so that disabling beside it drops nothing that is typed. */
  protected readonly controls = computed<PersonControls | null>(() => {
    const user = valueOf(this.#read);
    return user ? personControls(user) : null;
  });
  protected readonly patientAlone = computed(() => this.user()?.roles.join() === 'patient');
  protected readonly own = computed(() => this.#session.user()?.id === this.id());
  protected readonly busy = signal(false);
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(
    () => this.#refused() ?? failureOf(this.#read) ?? failureOf(this.#sites),
  );
  protected readonly states = accountStates;

  protected async save(user: User, controls: PersonControls): Promise<void> {
    controls.markAllAsTouched();
    if (controls.invalid) return;
    const change = changeOf(user, controls.getRawValue());
    if (change === null) {
      void this.#notices.say('Nothing was changed.');
      return;
    }
    const saved = await this.#try(this.#client.change(user.id, change), controls);
    if (saved) {
      this.user.set(saved);
      void this.#notices.say('Saved. It counts from their next click on.');
    }
  }

  protected async setDisabled(user: User, disabled: boolean): Promise<void> {
    if (!(await this.#switch(user.id, disabled))) return;
    const done = disabled
      ? `${user.displayName} is signed out and can’t sign in.`
      : `${user.displayName} may sign in again.`;
    void this.#notices.offerUndo(done, () => void this.#switch(user.id, !disabled));
  }

  protected async inviteAgain(user: User): Promise<void> {
    if ((await this.#try(this.#client.inviteAgain(user.id))) === undefined) return;
    void this.#notices.say('The invitation is sent again, at most once an hour.');
  }

  protected async endSessions(user: User): Promise<void> {
    if ((await this.#try(this.#client.endSessions(user.id))) === undefined) return;
    void this.#notices.say(`${user.displayName} is signed out everywhere.`);
  }

  async #switch(id: string, disabled: boolean): Promise<boolean> {
    const change: UserChange = { disabled };
    const saved = await this.#try(this.#client.change(id, change));
    if (saved) this.user.update((shown) => (shown?.id === id ? saved : shown));
    return saved !== undefined;
  }

  /** The answer, null for an empty one; undefined when the call failed, which is then told. */
  async #try<T>(call: Observable<T>, controls?: PersonControls): Promise<T | undefined> {
    if (this.busy()) return undefined;
    this.busy.set(true);
    this.#refused.set(null);
    try {
      return await firstValueFrom(call);
    } catch (error) {
      const problem = toProblem(error);
      if (controls) showFieldErrors(controls, problem.errors);
      this.#refused.set(problem);
      return undefined;
    } finally {
      this.busy.set(false);
    }
  }
}

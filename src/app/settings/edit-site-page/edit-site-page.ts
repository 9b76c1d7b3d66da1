import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { ChangedSite } from '@shared/contracts/sites-contract';
import { EMPTY, firstValueFrom, switchMap } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { SettingsClient } from '../settings-client';
import { showSiteProblem, siteControls } from '../site-form/site-controls';
import { SiteForm } from '../site-form/site-form';

function outcomeOf({ site, movedClassDates }: ChangedSite): string {
  if (movedClassDates === 0) return `${site.name} is saved.`;
  const dates = movedClassDates === 1 ? '1 class date' : `${movedClassDates} class dates`;
  return `${site.name} is saved. ${dates} moved to the new zone.`;
}

/** Changes a site; another zone moves its classes to come. */
@Component({
  selector: 'app-edit-site-page',
  imports: [
    EmptyState,
    MatButton,
    PageHeader,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    SiteForm,
    Skeleton,
  ],
  templateUrl: './edit-site-page.html',
  styleUrls: ['../settings-page.scss', './edit-site-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EditSitePage {
  readonly #client = inject(SettingsClient);
  readonly #router = inject(Router);
  readonly #notices = inject(Notices);
  /** From the route. */
  readonly id = input.required<string>();

  protected readonly read = this.#client.siteDetails();
  protected readonly site = computed(() => valueOf(this.read)?.find(({ id }) => id === this.id()));
  protected readonly loaded = computed(() => valueOf(this.read) !== undefined);
  protected readonly controls = computed(() => {
    const site = this.site();
    return site ? siteControls(site) : null;
  });
  readonly #zone = toSignal(
    toObservable(this.controls).pipe(
      switchMap((controls) => controls?.controls.timeZone.valueChanges ?? EMPTY),
    ),
  );
  protected readonly zoneChanges = computed(() => {
    const zone = this.#zone();
    return zone !== undefined && zone !== this.site()?.timeZone;
  });
  protected readonly sending = signal(false);
  readonly #refused = signal<Problem | null>(null);
  protected readonly problem = computed(() => this.#refused() ?? failureOf(this.read));

  protected async save(): Promise<void> {
    const [site, controls] = [this.site(), this.controls()];
    controls?.markAllAsTouched();
    if (!site || !controls || controls.invalid || this.sending()) return;
    this.sending.set(true);
    this.#refused.set(null);
    try {
      const change = { ...controls.getRawValue(), version: site.version };
      const saved = await firstValueFrom(this.#client.changeSite(site.id, change));
      void this.#notices.say(outcomeOf(saved));
      await this.#router.navigateByUrl('/settings/sites');
    } catch (error) {
      this.#refused.set(showSiteProblem(controls, toProblem(error)));
    } finally {
      this.sending.set(false);
    }
  }

  /** Shows the site as somebody else has changed it. */
  protected readAgain(): void {
    this.#refused.set(null);
    this.read.reload();
  }
}

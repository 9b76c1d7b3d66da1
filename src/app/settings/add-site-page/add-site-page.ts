import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { firstValueFrom } from 'rxjs';
import { Notices } from '../../core/notices';
import { type Problem, toProblem } from '../../core/problem';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { SettingsClient } from '../settings-client';
import { showSiteProblem, siteControls } from '../site-form/site-controls';
import { SiteForm } from '../site-form/site-form';

/** Adds a site. */
@Component({
  selector: 'app-add-site-page',
  imports: [MatButton, PageHeader, ProblemMessage, ReactiveFormsModule, RouterLink, SiteForm],
  templateUrl: './add-site-page.html',
  styleUrl: '../settings-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddSitePage {
  readonly #client = inject(SettingsClient);
  readonly #router = inject(Router);
  readonly #notices = inject(Notices);

  protected readonly form = siteControls({
    name: '',
    timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
    address: '',
    phone: '',
  });
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      const site = await firstValueFrom(this.#client.addSite(this.form.getRawValue()));
      void this.#notices.say(`${site.name} is added. Choose who works there under People.`);
      await this.#router.navigateByUrl('/settings/sites');
    } catch (error) {
      this.problem.set(showSiteProblem(this.form, toProblem(error)));
    } finally {
      this.sending.set(false);
    }
  }
}

import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { failureOf, valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { SettingsClient } from '../settings-client';
import { timeIn } from '../time-zones';

/** Where the program holds its classes. */
@Component({
  selector: 'app-sites-page',
  imports: [EmptyState, Icon, MatButton, PageHeader, ProblemMessage, RouterLink, Skeleton],
  templateUrl: './sites-page.html',
  styleUrl: '../settings-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SitesPage {
  protected readonly read = inject(SettingsClient).siteDetails();
  protected readonly problem = computed(() => failureOf(this.read));
  readonly #now = new Date();
  protected readonly sites = computed(() =>
    valueOf(this.read)?.map((site) => ({ ...site, time: timeIn(site.timeZone, this.#now) })),
  );
}

import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { mayOpen } from '../../core/navigation';
import { Session } from '../../core/session';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { settingsPages } from '../settings-pages';

/** What there is to set, and to look up, for the roles of who looks. */
@Component({
  selector: 'app-settings-home',
  imports: [Icon, PageHeader, RouterLink],
  templateUrl: './settings-home.html',
  styleUrl: './settings-home.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SettingsHome {
  readonly #session = inject(Session);
  protected readonly pages = computed(() =>
    settingsPages.filter((page) => mayOpen(page, this.#session.roles())),
  );
}

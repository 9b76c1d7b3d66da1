import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type OnInit,
  computed,
  inject,
  input,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { User } from '@shared/contracts/accounts-contract';
import { PagedList } from '../../core/paged-list';
import { failureOf, valueOf } from '../../core/resource-state';
import { roleNames } from '../../core/role-names';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { accountStates } from '../account-state';
import { SettingsClient } from '../settings-client';

/** Who has an account: staff, or patients who were invited. */
@Component({
  selector: 'app-people-page',
  imports: [
    EmptyState,
    Icon,
    MatButton,
    PageHeader,
    ProblemMessage,
    RouterLink,
    ShowMore,
    Skeleton,
    StateChip,
  ],
  templateUrl: './people-page.html',
  styleUrls: ['../settings-page.scss', './people-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PeoplePage implements OnInit {
  readonly #client = inject(SettingsClient);
  readonly #sites = this.#client.sites();
  /** From the route. */
  readonly who = input.required<'staff' | 'patients'>();

  protected readonly list = new PagedList<User>(
    (cursor) => this.#client.users(this.who(), cursor),
    inject(DestroyRef),
  );
  protected readonly problem = computed(() => this.list.problem() ?? failureOf(this.#sites));
  readonly #siteNames = computed(
    () => new Map((valueOf(this.#sites) ?? []).map(({ id, name }) => [id, name])),
  );
  protected readonly rows = computed(() =>
    this.list.items()?.map((user) => ({
      ...user,
      roleNames: user.roles.map((role) => roleNames[role]).join(', '),
      siteNames: user.siteIds.map((id) => this.#siteNames().get(id) ?? '').join(', '),
      state: accountStates[user.status],
    })),
  );

  ngOnInit(): void {
    this.list.load();
  }
}

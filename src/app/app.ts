import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { filter } from 'rxjs';
import { routedPaths } from './core/access-guard';
import { AccountMenu } from './core/account-menu/account-menu';
import { ColourScheme } from './core/colour-scheme';
import { areasFor } from './core/navigation';
import { PageFocus } from './core/page-focus';
import { Session } from './core/session';
import { Icon } from './ui/icon/icon';
import { Mark } from './ui/mark/mark';
import { ProblemMessage } from './ui/problem-message/problem-message';

/** The shell: skip link, demo banner, rail or bars, and the page. */
@Component({
  selector: 'app-root',
  imports: [AccountMenu, Icon, Mark, ProblemMessage, RouterLink, RouterLinkActive, RouterOutlet],
  templateUrl: './app.html',
  styleUrl: './app.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  readonly #router = inject(Router);
  readonly #pageFocus = inject(PageFocus);
  protected readonly session = inject(Session);
  readonly #url = signal('');

  /** Patient pages are set larger, for older eyes. */
  protected readonly patientPage = computed(() => /^\/(my|unsubscribe)\//.test(this.#url()));
  protected readonly areas = computed(() =>
    areasFor(this.session.roles(), routedPaths(this.#router)),
  );

  constructor() {
    inject(ColourScheme);
    this.#pageFocus.follow();
    this.#router.events
      .pipe(
        filter((event) => event instanceof NavigationEnd),
        takeUntilDestroyed(),
      )
      .subscribe((event) => this.#url.set(event.urlAfterRedirects));
  }

  protected skip(event: Event): void {
    event.preventDefault();
    this.#pageFocus.focusHeading();
  }

  protected async reload(): Promise<void> {
    await this.session.load();
    await this.#router.navigateByUrl(this.#router.url, { onSameUrlNavigation: 'reload' });
  }
}

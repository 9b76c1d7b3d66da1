import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  inject,
  viewChild,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import { Icon } from '../../ui/icon/icon';
import { ColourScheme, type Scheme, schemes } from '../colour-scheme';
import { mayOpen, staff } from '../navigation';
import { roleNames } from '../role-names';
import { Session } from '../session';

const schemeNames: Record<Scheme, string> = {
  system: 'As this device',
  light: 'Light',
  dark: 'Dark',
};

/** Who is signed in, the choice of colours, and the way out; a native popover, so it closes with Escape. */
@Component({
  selector: 'app-account-menu',
  imports: [Icon, RouterLink],
  templateUrl: './account-menu.html',
  styleUrl: './account-menu.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AccountMenu {
  readonly #session = inject(Session);
  readonly #router = inject(Router);
  readonly #colourScheme = inject(ColourScheme);

  protected readonly panel = viewChild.required<ElementRef<HTMLElement>>('panel');
  protected readonly user = this.#session.user;
  protected readonly roles = computed(() =>
    this.#session
      .roles()
      .map((role) => roleNames[role])
      .join(', '),
  );
  /** The description of the calls is open to staff. */
  protected readonly reference = computed(() => mayOpen({ roles: staff }, this.#session.roles()));
  protected readonly scheme = this.#colourScheme.choice;
  protected readonly schemes = schemes.map((value) => ({ value, name: schemeNames[value] }));

  protected choose(scheme: Scheme): void {
    this.#colourScheme.choice.set(scheme);
  }

  protected close(): void {
    this.panel().nativeElement.hidePopover();
  }

  protected async signOut(): Promise<void> {
    this.close();
    await this.#session.signOut();
    await this.#router.navigateByUrl('/sign-in');
  }
}

import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  inject,
  viewChild,
} from '@angular/core';
import { Router } from '@angular/router';
import type { Role } from '@shared/contracts/accounts-contract';
import { Icon } from '../../ui/icon/icon';
import { ColourScheme, type Scheme, schemes } from '../colour-scheme';
import { Session } from '../session';

const roleNames: Record<Role, string> = {
  patient: 'Patient',
  nurse: 'Nurse',
  'exercise-physiologist': 'Exercise physiologist',
  physician: 'Physician',
  'front-desk': 'Front desk',
  director: 'Program director',
  administrator: 'Administrator',
};

const schemeNames: Record<Scheme, string> = {
  system: 'As this device',
  light: 'Light',
  dark: 'Dark',
};

/** Who is signed in, the choice of colours, and the way out; a native popover, so it closes with Escape. */
@Component({
  selector: 'app-account-menu',
  imports: [Icon],
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
  protected readonly scheme = this.#colourScheme.choice;
  protected readonly schemes = schemes.map((value) => ({ value, name: schemeNames[value] }));

  protected choose(scheme: Scheme): void {
    this.#colourScheme.choice.set(scheme);
  }

  protected async signOut(): Promise<void> {
    this.panel().nativeElement.hidePopover();
    await this.#session.signOut();
    await this.#router.navigateByUrl('/sign-in');
  }
}

import { Injectable, inject } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { type RouterStateSnapshot, TitleStrategy } from '@angular/router';

/** "Patients · Plimsoll"; never a patient's name, which browsers keep in their history. */
@Injectable()
export class PageTitle extends TitleStrategy {
  readonly #title = inject(Title);

  override updateTitle(state: RouterStateSnapshot): void {
    const title = this.buildTitle(state);
    this.#title.setTitle(title === undefined ? 'Plimsoll' : `${title} · Plimsoll`);
  }
}

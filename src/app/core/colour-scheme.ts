import { DOCUMENT, Injectable, effect, inject, signal } from '@angular/core';

export const schemes = ['system', 'light', 'dark'] as const;
export type Scheme = (typeof schemes)[number];

const key = 'plimsoll.scheme';

/** Light, dark, or as the device says; the choice stays on this device. */
@Injectable({ providedIn: 'root' })
export class ColourScheme {
  readonly #document = inject(DOCUMENT);
  readonly #storage = this.#document.defaultView?.localStorage;
  readonly choice = signal<Scheme>(this.#stored());

  constructor() {
    effect(() => {
      const choice = this.choice();
      const { classList } = this.#document.documentElement;
      classList.toggle('scheme-light', choice === 'light');
      classList.toggle('scheme-dark', choice === 'dark');
      this.#storage?.setItem(key, choice);
    });
  }

  #stored(): Scheme {
    const kept = this.#storage?.getItem(key);
    return schemes.find((scheme) => scheme === kept) ?? 'system';
  }
}

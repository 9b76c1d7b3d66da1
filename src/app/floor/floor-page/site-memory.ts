import { DOCUMENT, Injectable, inject } from '@angular/core';

const key = 'plimsoll.floor.site';

/** The site that this device stands at. */
@Injectable({ providedIn: 'root' })
export class SiteMemory {
  readonly #storage = inject(DOCUMENT).defaultView?.localStorage;

  site(): string | null {
    return this.#storage?.getItem(key) ?? null;
  }

  keep(siteId: string): void {
    this.#storage?.setItem(key, siteId);
  }
}

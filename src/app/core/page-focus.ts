import { DOCUMENT, DestroyRef, Injectable, Injector, afterNextRender, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { NavigationEnd, Router } from '@angular/router';
import { filter, map, pairwise } from 'rxjs';

function pathOf(url: string): string {
  return url.split(/[?#]/, 1)[0] ?? url;
}

/** After a move to another page the focus goes to its heading, so that keyboard and screen reader start there. */
@Injectable({ providedIn: 'root' })
export class PageFocus {
  readonly #document = inject(DOCUMENT);
  readonly #injector = inject(Injector);
  readonly #destroyRef = inject(DestroyRef);
  readonly #router = inject(Router);

  follow(): void {
    this.#router.events
      .pipe(
        filter((event) => event instanceof NavigationEnd),
        map((event) => pathOf(event.urlAfterRedirects)),
        pairwise(),
        filter(([from, to]) => from !== to),
        takeUntilDestroyed(this.#destroyRef),
      )
      .subscribe(() => {
        afterNextRender(() => this.focusHeading(), { injector: this.#injector });
      });
  }

  focusHeading(): void {
    const heading = this.#document.querySelector<HTMLElement>('main h1');
    const target = heading ?? this.#document.querySelector<HTMLElement>('main');
    if (target === null) return;
    target.tabIndex = -1;
    target.focus();
  }
}

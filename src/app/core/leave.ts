import { DOCUMENT, InjectionToken, inject } from '@angular/core';

/** Leaves the product for another site's page. */
export const LEAVE = new InjectionToken<(url: string) => void>('leave', {
  providedIn: 'root',
  factory: () => {
    const { location } = inject(DOCUMENT);
    return (url) => location.assign(url);
  },
});

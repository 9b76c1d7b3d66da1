import { inject } from '@angular/core';
import { type CanMatchFn, RedirectCommand, Router } from '@angular/router';
import { type Area, landingFor, mayOpen } from './navigation';
import { Session } from './session';

export function routedPaths(router: Router): string[] {
  return router.config.map((route) => route.path ?? '');
}

/** The page of the signed-in person's first task, or the sign-in page. */
export function landing(): string {
  const session = inject(Session);
  return session.user() === null
    ? '/sign-in'
    : landingFor(session.roles(), routedPaths(inject(Router)));
}

/** Opens an area to those whose role allows it; asks a visitor to sign in and keeps the page they wanted. */
export function allow(area: Pick<Area, 'roles'>): CanMatchFn {
  return () => {
    const session = inject(Session);
    const router = inject(Router);
    if (session.user() === null) {
      const wanted = router.currentNavigation()?.extractedUrl.toString() ?? '/';
      return router.createUrlTree(['/sign-in'], { queryParams: { return: wanted } });
    }
    if (mayOpen(area, session.roles())) return true;
    return new RedirectCommand(router.parseUrl('/not-allowed'), { skipLocationChange: true });
  };
}

/** Sends who is signed in already from the sign-in page to their first task. */
export const signedOut: CanMatchFn = () =>
  inject(Session).user() === null || inject(Router).parseUrl(landing());

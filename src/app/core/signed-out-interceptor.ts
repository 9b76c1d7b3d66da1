import type { HttpInterceptorFn } from '@angular/common/http';
import { inject } from '@angular/core';
import { Router } from '@angular/router';
import { tap } from 'rxjs';
import { Problem } from './problem';
import { Session } from './session';

/** When the server no longer knows the session: to the sign-in page, which leads back here. */
export const signedOutInterceptor: HttpInterceptorFn = (request, next) => {
  const session = inject(Session);
  const router = inject(Router);
  return next(request).pipe(
    tap({
      error: (error: unknown) => {
        const ended = error instanceof Problem && error.code === 'unauthenticated';
        if (!ended || session.user() === null) return;
        session.forget();
        void router.navigate(['/sign-in'], { queryParams: { return: router.url, ended: true } });
      },
    }),
  );
};

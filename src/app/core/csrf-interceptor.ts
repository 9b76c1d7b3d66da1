import {
  HttpBackend,
  type HttpInterceptorFn,
  HttpRequest,
  HttpXsrfTokenExtractor,
} from '@angular/common/http';
import { inject } from '@angular/core';
import { catchError, concatMap, last, throwError } from 'rxjs';
import { Problem } from './problem';

/** A write refused for an outdated token (signed in elsewhere, server restarted) is sent once more with a fresh one. */
export const csrfInterceptor: HttpInterceptorFn = (request, next) => {
  const backend = inject(HttpBackend);
  const tokens = inject(HttpXsrfTokenExtractor);
  return next(request).pipe(
    catchError((error: unknown) => {
      if (!(error instanceof Problem) || error.code !== 'csrf') return throwError(() => error);
      return backend.handle(new HttpRequest('GET', '/api/auth/session')).pipe(
        last(),
        concatMap(() => {
          const token = tokens.getToken();
          if (token === null) return throwError(() => error);
          return next(request.clone({ setHeaders: { 'X-XSRF-TOKEN': token } }));
        }),
      );
    }),
  );
};

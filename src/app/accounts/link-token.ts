import { inject } from '@angular/core';
import { ActivatedRoute, Router } from '@angular/router';

/**
 * The token of a link from a message, from the address's fragment: no server and no log sees it there. It leaves the address
 * bar and the history at once. Called where things can be injected; null when the link is not whole.
 */
export function takeLinkToken(): string | null {
  const { snapshot } = inject(ActivatedRoute);
  const router = inject(Router);
  const token = new URLSearchParams(snapshot.fragment ?? '').get('token');
  if (token !== null) void router.navigate([], { replaceUrl: true });
  return token;
}

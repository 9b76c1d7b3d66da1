import { inject } from '@angular/core';
import type { CanDeactivateFn } from '@angular/router';
import { Notices } from '../core/notices';
import { EntryQueue } from './entry-queue/entry-queue';

/** Says so when the floor is left with entries that are still here; they go on being sent while Plimsoll is open. */
export const tellOfUnsent: CanDeactivateFn<unknown> = () => {
  const left = inject(EntryQueue).entries().length;
  if (left > 0) {
    const entries = left === 1 ? '1 entry is' : `${left} entries are`;
    void inject(Notices).say(`${entries} not saved yet. Keep Plimsoll open until they are.`);
  }
  return true;
};

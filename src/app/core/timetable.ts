import { type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable } from '@angular/core';
import {
  type ClassDate,
  type ClassDatesQuery,
  classDatesResponseSchema,
} from '@shared/contracts/schedule-contract';
import { type Site, sitesResponseSchema } from '@shared/contracts/sites-contract';

/** The sites and their classes, as staff and patients read them alike. Resources need an injection context. */
@Injectable({ providedIn: 'root' })
export class Timetable {
  sites(): HttpResourceRef<readonly Site[] | undefined> {
    return httpResource(() => '/api/sites', {
      parse: (body) => sitesResponseSchema.parse(body).items,
    });
  }

  /** @param query undefined while it is not known yet */
  classDates(
    query: () => ClassDatesQuery | undefined,
  ): HttpResourceRef<readonly ClassDate[] | undefined> {
    return httpResource(
      () => {
        const asked = query();
        return asked && { url: '/api/class-dates', params: { ...asked } };
      },
      { parse: (body) => classDatesResponseSchema.parse(body).items },
    );
  }
}

import { type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable } from '@angular/core';
import { type MyRange, myRangeSchema } from '@shared/contracts/my-range-contract';

@Injectable({ providedIn: 'root' })
export class MyRangeClient {
  range(): HttpResourceRef<MyRange | undefined> {
    return httpResource(() => '/api/my/range', { parse: (answer) => myRangeSchema.parse(answer) });
  }
}

import { type HttpResourceRef, httpResource } from '@angular/common/http';
import { Injectable } from '@angular/core';
import { type MyProgress, myProgressSchema } from '@shared/contracts/my-progress-contract';

@Injectable({ providedIn: 'root' })
export class MyProgressClient {
  progress(): HttpResourceRef<MyProgress | undefined> {
    return httpResource(() => '/api/my/progress', {
      parse: (answer) => myProgressSchema.parse(answer),
    });
  }
}

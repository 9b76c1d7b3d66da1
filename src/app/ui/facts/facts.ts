import { ChangeDetectionStrategy, Component } from '@angular/core';

/** A list of facts: put `app-fact` in it. */
@Component({
  selector: 'app-facts',
  template: '<dl><ng-content /></dl>',
  styles: 'dl { margin: 0; }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Facts {}

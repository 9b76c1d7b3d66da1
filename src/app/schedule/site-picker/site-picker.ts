import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { otherZoneNote } from '../../ui/site-time/site-time';
import { SiteChoice } from '../site-choice';

/** Chooses the site, and says its clock where it differs from the browser's. */
@Component({
  selector: 'app-site-picker',
  template: `
    <label>
      <span>Site</span>
      <select #picker (change)="choice.choose(picker.value)">
        @for (site of choice.sites(); track site.id) {
          <option [value]="site.id" [selected]="site.id === choice.site()?.id">
            {{ site.name }}
          </option>
        }
      </select>
    </label>
    @if (zoneNote(); as note) {
      <p class="note">{{ note }}</p>
    }
  `,
  styleUrl: './site-picker.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SitePicker {
  protected readonly choice = inject(SiteChoice);
  protected readonly zoneNote = computed(() => {
    const site = this.choice.site();
    return site ? otherZoneNote(site, new Date()) : null;
  });
}

import { FormControl, FormGroup } from '@angular/forms';
import { type NewSite, newSiteSchema } from '@shared/contracts/sites-contract';
import type { Problem } from '../../core/problem';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';

const rules = newSiteSchema.shape;

const field = (name: keyof NewSite, value: string) =>
  new FormControl(value, { nonNullable: true, validators: zodValidator(rules[name]) });

/** A site's fields, filled with what there is. */
export const siteControls = ({ name, timeZone, address, phone }: NewSite) =>
  new FormGroup({
    name: field('name', name),
    timeZone: field('timeZone', timeZone),
    address: field('address', address),
    phone: field('phone', phone),
  });

export type SiteControls = ReturnType<typeof siteControls>;

/** Shows what it can beside the fields. @returns what is left to show on the page */
export function showSiteProblem(controls: SiteControls, problem: Problem): Problem | null {
  if (problem.code === 'already-recorded') {
    controls.controls.name.setErrors({ server: 'Another site has this name' });
    return null;
  }
  const elsewhere = showFieldErrors(controls, problem.errors);
  return problem.errors.length === 0 || elsewhere.length > 0 ? problem : null;
}

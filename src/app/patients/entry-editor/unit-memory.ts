import { Injectable } from '@angular/core';
import type { UnitNames } from './entry-group';

const place = 'plimsoll.units';

/** Which unit each field was last typed in on this device. */
@Injectable({ providedIn: 'root' })
export class UnitMemory {
  read(): UnitNames {
    try {
      const kept: unknown = JSON.parse(localStorage.getItem(place) ?? '{}');
      return typeof kept === 'object' && kept !== null ? (kept as UnitNames) : {};
    } catch {
      return {};
    }
  }

  keep(units: UnitNames): void {
    try {
      localStorage.setItem(place, JSON.stringify({ ...this.read(), ...units }));
    } catch {
      // A device that keeps nothing begins with the usual unit each time.
    }
  }
}

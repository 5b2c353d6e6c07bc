import { Injectable, computed, inject } from '@angular/core';
import type { UnitSymbol } from '#shared/units/units';
import { CurrentCase } from '../current-case';

/** The units that the case is worked in; figures in SI stand beside them. */
@Injectable()
export class Preferences {
  private readonly current = inject(CurrentCase);

  /** Speeds are shown in this unit beside m/s. */
  readonly speedUnit = computed<UnitSymbol>(() => this.current.file().speedUnit);
  readonly lengthUnit = computed<UnitSymbol>(() => 'm');
  readonly feet = computed(() => this.speedUnit() === 'mph');
}

import type { ValueComparison } from '@/lib/engine/inertia/compare-values';
import type { DifferencesAnswer } from '@/lib/rules/outdated-lock';

/** A comparison under the names of the API. */
export function toDifferencesAnswer(differences: ValueComparison): DifferencesAnswer {
  return {
    mass_change: differences.massChange,
    com_shift_m: differences.comShiftM,
    com_shift_of_size: differences.comShiftOfSize,
    principal_change: differences.principalChange,
    inertia_change: differences.inertiaChange,
    rotation_deg: differences.rotationDeg,
  };
}

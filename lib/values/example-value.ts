import { computeValue, type ComputedValue } from './compute-value';
import { NO_SETTING } from './value-inputs';

/** The value of an oak cube of 20 cm, for the page of conventions: worked out by what works out every value. */
export function exampleValue(): ComputedValue {
  return computeValue({
    record: { contentSha256: '0'.repeat(64), scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group', engineVersion: '1' },
    asset: 'block',
    part: 'cube',
    upAxis: 'y',
    metresPerUnit: 0.01,
    scale: 1,
    setting: { ...NO_SETTING, densityKgPerM3: 700 },
    components: [
      {
        solid: { volume: 8000, centroid: [10, 10, 10], centralSecond: [8000 * (400 / 12), 8000 * (400 / 12), 8000 * (400 / 12), 0, 0, 0] },
        surface: { area: 2400, centroid: [10, 10, 10], centralSecond: [2400 * (1000 / 18), 2400 * (1000 / 18), 2400 * (1000 / 18), 0, 0, 0] },
        hollow: null,
        hollowLimits: null,
        errorEstimate: 1e-16,
        surfaceErrorEstimate: 1e-16,
        cageVolume: 8000,
      },
    ],
    bounds: [0, 0, 0, 20, 20, 20],
    findings: [],
  });
}

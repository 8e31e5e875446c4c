import { describe, expect, it } from 'vitest';
import { STUDIO_MATERIALS } from '@/db/seed/materials';

const densityOf = (name: string) => STUDIO_MATERIALS.find((material) => material.name === name)?.densityKgPerM3;

describe('the studio library', () => {
  it('gives every material one positive density with a source, under a name of its own', () => {
    for (const material of STUDIO_MATERIALS) {
      const given = [material.densityKgPerM3, material.arealDensityKgPerM2].filter((value) => value !== null);
      expect(given).toHaveLength(1);
      expect(given[0]).toBeGreaterThan(0);
      expect(given[0]).toBeLessThan(Infinity);
      expect(material.source.trim()).not.toBe('');
      if (material.low !== null) expect(material.low).toBeLessThanOrEqual(given[0] ?? NaN);
      if (material.high !== null) expect(material.high).toBeGreaterThanOrEqual(given[0] ?? NaN);
    }
    expect(new Set(STUDIO_MATERIALS.map((material) => material.name.toLowerCase())).size).toBe(STUDIO_MATERIALS.length);
  });

  it('marks exactly the numbers that nobody read in a table', () => {
    for (const material of STUDIO_MATERIALS) expect(material.source.includes('; read in ')).toBe(!material.fromMemory);
  });

  // NIST elemental densities (iron, copper, lead, gold, aluminium); USDA Wood Handbook, table 5-3: G = 0.68 for white oak at 12 % moisture.
  it.each([['Iron', 7874], ['Copper', 8960], ['Lead', 11350], ['Gold', 19320], ['Aluminium', 2699], ['White oak', 1000 * 0.68 * 1.12]])('has %s at its published density', (name, density) => {
    expect(densityOf(name)).toBeCloseTo(density, 9);
  });
});

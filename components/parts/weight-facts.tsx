import type { AssetTotal, PartRow } from '@/lib/rules/part-row';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';
import { Facts, Section, type Fact } from './facts';
import { InertiaMatrix } from './inertia-matrix';

type Weighed = PartRow | AssetTotal;

const FREE_AXES_WORDS: Record<string, string> = {
  '12': 'Axes 1 and 2 are free: the part turns alike about any direction of their plane.',
  '23': 'Axes 2 and 3 are free: the part turns alike about any direction of their plane.',
  '123': 'All axes are free: the part turns alike about every direction.',
};

function inUnit(metres: number | null, unit: LinearUnit): number | null {
  return metres === null ? null : metres / METRES_PER[unit];
}

/** Grams below a tenth of a kilogram, as the screens write masses. */
export function massFact(massKg: number | null): Fact {
  const grams = massKg !== null && massKg < 0.1;
  return { label: 'Mass', unit: grams ? 'g' : 'kg', value: grams ? massKg * 1000 : massKg };
}

/** Where it balances and how it resists turning: of a part, a body or an asset. */
export function WeightFacts({ of, unit }: { of: Weighed; unit: LinearUnit }) {
  const free = 'free_axes' in of && of.free_axes !== null ? FREE_AXES_WORDS[of.free_axes] : undefined;
  return (
    <>
      <Section title={`Centre of mass in the axes of ${of.asset}`}>
        <Facts
          facts={(['x', 'y', 'z'] as const).map((axis) => ({
            label: axis,
            unit,
            value: inUnit(of[`com_${axis}_m`], unit),
            notation: 'fixed',
          }))}
        />
      </Section>
      <Section title="Principal moments about the centre of mass">
        <Facts
          facts={([1, 2, 3] as const).map((index) => ({
            label: (
              <>
                I<sub>{index}</sub>
              </>
            ),
            unit: 'kg m²',
            value: of[`i${index}_kg_m2`],
          }))}
        />
        {free === undefined ? null : <p className="mt-1 text-13 text-ink-2">{free}</p>}
      </Section>
      <Section title={`Inertia matrix in the axes of ${of.asset}, kg m²`}>
        <InertiaMatrix of={of} />
      </Section>
    </>
  );
}

import { Figure } from '@/components/ui/figure';
import { formatEngineering } from '@/lib/rules/format-figure';
import type { AssetTotal, PartRow } from '@/lib/rules/part-row';

const AXES = ['x', 'y', 'z'] as const;
const ALIGN = { before: 4, after: 4 };

type Entry = 'ixx_kg_m2' | 'iyy_kg_m2' | 'izz_kg_m2' | 'ixy_kg_m2' | 'ixz_kg_m2' | 'iyz_kg_m2';

function entryOf(a: string, b: string): Entry {
  return `i${[a, b].sort().join('')}_kg_m2` as Entry;
}

/** The six entries as the symmetric matrix that they are, in one power of ten, which stands beside it. */
export function InertiaMatrix({ of }: { of: PartRow | AssetTotal }) {
  const largest = Math.max(...AXES.map((axis) => Math.abs(of[entryOf(axis, axis)] ?? 0)));
  if (of.ixx_kg_m2 === null) return <p className="text-13 text-ink-3">–</p>;
  const { exponent } = formatEngineering(largest);
  const scale = 10 ** exponent;
  return (
    <table className="text-13">
      <caption className="sr-only">Inertia matrix, each number times ten to the power {exponent}</caption>
      <thead>
        <tr>
          <td className="pr-2 text-12 text-ink-3">
            {exponent === 0 ? null : (
              <span title="for every entry">
                ·10<sup>{String(exponent).replace('-', '\u2212')}</sup>
              </span>
            )}
          </td>
          {AXES.map((axis) => (
            <th key={axis} scope="col" className="px-1 text-right text-12 font-normal text-ink-3">
              {axis}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {AXES.map((row, i) => (
          <tr key={row}>
            <th scope="row" className="pr-2 text-left text-12 font-normal text-ink-3">
              {row}
            </th>
            {AXES.map((column, j) => {
              const value = of[entryOf(row, column)];
              return (
                <td key={column} className="px-1 py-0.5">
                  <Figure
                    value={value === null ? null : value / scale}
                    full={value}
                    decimals={3}
                    align={ALIGN}
                    className={j < i ? 'text-ink-3' : undefined}
                  />
                </td>
              );
            })}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

'use client';

import { Maximize } from 'lucide-react';
import dynamic from 'next/dynamic';
import { useState } from 'react';
import { Chip } from '@/components/ui/chip';
import { IconButton } from '@/components/ui/icon-button';
import { useTokenColours } from '@/hooks/use-token-colours';
import type { LinearUnit, UpAxis } from '@/lib/rules/units';
import { describeWeight } from './describe-weight';
import type { DrawnWeight, ViewChoices } from './part-scene';
import type { DrawnAsset } from './read-asset-mesh';
import { ViewerFrame } from './viewer-frame';

// three.js is read only where something is drawn.
const PartScene = dynamic(() => import('./part-scene'), { ssr: false });

interface PartViewerProps {
  asset: DrawnAsset | null;
  part: string;
  weight: DrawnWeight | null;
  unit: LinearUnit;
  up: UpAxis;
  /** Why there is nothing to draw. */
  failure?: string | null;
  /** Whether the rest of the asset is drawn from the start. */
  withRest?: boolean;
}

const CHOICES: readonly { key: keyof ViewChoices; label: string; needsWeight: boolean }[] = [
  { key: 'cage', label: 'Control cage', needsWeight: false },
  { key: 'axes', label: 'Principal axes', needsWeight: true },
  { key: 'solid', label: 'Equal solid ellipsoid', needsWeight: true },
  { key: 'rest', label: 'Rest of the asset', needsWeight: false },
];

/** The limit surface in three dimensions, with its centre of mass and principal axes; the same in words for who does not see it. */
export function PartViewer({ asset, part, weight, unit, up, failure = null, withRest = false }: PartViewerProps) {
  const [choices, setChoices] = useState<ViewChoices>({ cage: false, axes: true, solid: false, rest: withRest });
  const [fit, setFit] = useState(0);
  const colours = useTokenColours();

  return (
    <figure className="flex min-h-0 flex-1 flex-col">
      <ViewerFrame
        label={`Limit surface of ${part}.`}
        failure={failure}
        reading={asset === null || colours === null ? 'Reading the surface' : null}
      >
        {asset === null || colours === null ? null : (
          <PartScene asset={asset} part={part} weight={weight} choices={choices} up={up} fit={fit} colours={colours} />
        )}
      </ViewerFrame>
      <div className="flex items-center gap-2 overflow-x-auto border-t border-rule px-4 py-2">
        {CHOICES.map(({ key, label, needsWeight }) => (
          <Chip
            key={key}
            pressed={choices[key]}
            disabled={needsWeight && weight === null}
            className="disabled:opacity-50"
            onClick={() => setChoices((now) => ({ ...now, [key]: !now[key] }))}
          >
            {label}
          </Chip>
        ))}
        <IconButton label="Bring into view" className="ml-auto" onClick={() => setFit((now) => now + 1)}>
          <Maximize aria-hidden />
        </IconButton>
      </div>
      <figcaption className="sr-only">{describeWeight(part, weight, unit)}</figcaption>
    </figure>
  );
}

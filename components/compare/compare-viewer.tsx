'use client';

import { Maximize } from 'lucide-react';
import dynamic from 'next/dynamic';
import { useMemo, useState } from 'react';
import { Chip } from '@/components/ui/chip';
import { IconButton } from '@/components/ui/icon-button';
import { describeWeight } from '@/components/viewer/describe-weight';
import type { DrawnWeight } from '@/components/viewer/part-scene';
import { useAssetMesh } from '@/components/viewer/use-asset-mesh';
import { ViewerFrame } from '@/components/viewer/viewer-frame';
import { useTokenColours } from '@/hooks/use-token-colours';
import type { ComparedNumbers, ComparisonAnswer } from '@/lib/rules/comparison';
import type { ShowFrame } from '@/lib/rules/show-frame';
import type { DrawnSide } from './compare-scene';

// three.js is read only where something is drawn.
const CompareScene = dynamic(() => import('./compare-scene'), { ssr: false });

/** Both surfaces over one another; the same in words for who does not see it. */
export function CompareViewer({ of, frame }: { of: ComparisonAnswer; frame: ShowFrame }) {
  const [solid, setSolid] = useState<'before' | 'after'>('after');
  const [axes, setAxes] = useState(true);
  const [fit, setFit] = useState(0);
  const colours = useTokenColours();
  const meshes = {
    before: useAssetMesh(frame.code, of.asset, of.before.version),
    after: useAssetMesh(frame.code, of.asset, of.after.version),
  };
  const before = useSide(meshes.before.data, of.before);
  const after = useSide(meshes.after.data, of.after);
  const failure = meshes.before.error ?? meshes.after.error;
  const reading = (meshes.before.isPending || meshes.after.isPending) && failure === null;
  const same = of.before.version === of.after.version && of.before.mesh_scale === of.after.mesh_scale;
  const name = of.part ?? of.asset;
  const words = (which: 'before' | 'after') =>
    `${which === 'before' ? 'Before' : 'After'}, ${of[which].name}: ${describeWeight(name, weightOf(of[which].numbers), frame.linear_unit)}`;

  return (
    <figure className="flex min-h-0 flex-1 flex-col">
      <ViewerFrame
        label={`Limit surfaces of ${name}, before and after.`}
        failure={failure?.message ?? null}
        reading={reading || colours === null ? 'Reading the surfaces' : null}
      >
        {colours === null ? null : (
          <CompareScene
            before={before}
            after={after}
            part={of.part}
            solid={solid}
            axes={axes}
            up={frame.up_axis}
            fit={fit}
            colours={colours}
          />
        )}
      </ViewerFrame>
      <div className="flex items-center gap-2 overflow-x-auto border-t border-rule px-4 py-2">
        {same ? (
          <p className="text-13 whitespace-nowrap text-ink-2">One surface, {of.after.version}</p>
        ) : (
          <>
            <Chip pressed={solid === 'after'} onClick={() => setSolid('after')}>
              After solid
            </Chip>
            <Chip pressed={solid === 'before'} onClick={() => setSolid('before')}>
              Before solid
            </Chip>
          </>
        )}
        <Chip pressed={axes} onClick={() => setAxes((now) => !now)}>
          Principal axes
        </Chip>
        <p className="ml-auto flex items-center gap-4 text-13 whitespace-nowrap text-ink-2 max-sm:hidden">
          <span className="flex items-center gap-1.5">
            <CentreShape full={false} /> before, axes 1′ 2′ 3′
          </span>
          <span className="flex items-center gap-1.5">
            <CentreShape full /> after, axes 1 2 3
          </span>
        </p>
        <IconButton label="Bring into view" className="max-sm:ml-auto" onClick={() => setFit((now) => now + 1)}>
          <Maximize aria-hidden />
        </IconButton>
      </div>
      <figcaption className="sr-only">
        {words('before')} {words('after')}
      </figcaption>
    </figure>
  );
}

/** The centre of mass as it is drawn: a hollow ring before, a full brass dot after. */
function CentreShape({ full }: { full: boolean }) {
  return (
    <svg
      viewBox="0 0 12 12"
      width="12"
      height="12"
      aria-hidden
      fill={full ? 'var(--brass)' : 'none'}
      stroke={full ? 'none' : 'var(--ink-2)'}
      strokeWidth="1.5"
    >
      <circle cx="6" cy="6" r={full ? 4 : 4.5} />
    </svg>
  );
}

function useSide(mesh: DrawnSide['asset'] | undefined, side: ComparisonAnswer['before']): DrawnSide | null {
  const { numbers, mesh_scale: scale } = side;
  return useMemo(
    () => (mesh === undefined ? null : { asset: mesh, scale, weight: weightOf(numbers) }),
    [mesh, scale, numbers],
  );
}

function weightOf(n: ComparedNumbers | null): DrawnWeight | null {
  return (
    n && {
      massKg: n.mass_kg,
      centreM: [n.com_x_m, n.com_y_m, n.com_z_m],
      momentsKgM2: [n.i1_kg_m2, n.i2_kg_m2, n.i3_kg_m2],
      quatWxyz: [n.axes_quat_w, n.axes_quat_x, n.axes_quat_y, n.axes_quat_z],
      freeAxes: n.free_axes,
    }
  );
}

'use client';

import { Canvas } from '@react-three/fiber';
import { useMemo } from 'react';
import { CanvasTexture, DoubleSide, Matrix4, SRGBColorSpace, Vector3, type BufferGeometry } from 'three';
import { Light } from '@/components/viewer/light';
import type { DrawnWeight } from '@/components/viewer/part-scene';
import { PrincipalAxes } from '@/components/viewer/principal-axes';
import type { DrawnAsset } from '@/components/viewer/read-asset-mesh';
import { sphereOf } from '@/components/viewer/sphere-of';
import { ViewControls } from '@/components/viewer/view-controls';
import type { TokenColours } from '@/hooks/use-token-colours';
import type { UpAxis } from '@/lib/rules/units';
import { Ghost } from './ghost';

/** One side as it is drawn; metres, the asset's axes. */
export interface DrawnSide {
  asset: DrawnAsset;
  /** What the surface is multiplied by, about the asset's origin. */
  scale: number;
  weight: DrawnWeight | null;
}

interface CompareSceneProps {
  before: DrawnSide | null;
  after: DrawnSide | null;
  /** Null: all parts. */
  part: string | null;
  /** Which of the two is the solid one; the other is a ghost. */
  solid: 'before' | 'after';
  axes: boolean;
  up: UpAxis;
  fit: number;
  colours: TokenColours;
}

type Three = [number, number, number];

function surfacesOf(side: DrawnSide | null, part: string | null): BufferGeometry[] {
  return (
    side?.asset.parts.flatMap((one) =>
      one.surface !== null && (part === null || one.name === part) ? [one.surface] : [],
    ) ?? []
  );
}

/** Where a side's geometry lies in the drawing, whose own origin is that of `base`, so that digits last. */
function placeOf(side: DrawnSide, base: Three): Three {
  return [0, 1, 2].map((i) => side.asset.origin[i] * side.scale - base[i]) as Three;
}

/** Both limit surfaces over one another, one solid and one as a ghost, with both centres of mass and both sets of axes. */
export default function CompareScene({ before, after, part, solid, axes, up, fit, colours }: CompareSceneProps) {
  const origin = after ?? before;
  const base = useMemo(
    (): Three => (origin === null ? [0, 0, 0] : (origin.asset.origin.map((value) => value * origin.scale) as Three)),
    [origin],
  );
  const sphere = useMemo(() => {
    const placed = [before, after].flatMap((side) => {
      if (side === null) return [];
      const place = new Matrix4()
        .makeTranslation(...placeOf(side, base))
        .scale(new Vector3(side.scale, side.scale, side.scale));
      return surfacesOf(side, part).map((geometry) => ({ geometry, place }));
    });
    return sphereOf(placed);
  }, [before, after, base, part]);

  return (
    <Canvas
      frameloop="demand"
      dpr={[1, 2]}
      camera={{ fov: 30 }}
      gl={{ antialias: true, alpha: true }}
      resize={{ scroll: false }}
    >
      <ViewControls centre={sphere.center.toArray()} radius={sphere.radius || 1} up={up} fit={fit} />
      <Light />
      {(['before', 'after'] as const).map((which) => {
        const side = which === 'before' ? before : after;
        // The same surface twice is drawn once.
        return side === null ||
          (which !== solid && before?.asset === after?.asset && before?.scale === after?.scale) ? null : (
          <group key={which} position={placeOf(side, base)} scale={side.scale}>
            {surfacesOf(side, part).map((geometry) =>
              solid === which ? (
                <Solid key={geometry.uuid} geometry={geometry} />
              ) : (
                <Ghost key={geometry.uuid} geometry={geometry} colour={colours.ink} />
              ),
            )}
          </group>
        );
      })}
      {before?.weight ? (
        <Balance
          weight={before.weight}
          base={base}
          radius={sphere.radius}
          which="before"
          axes={axes}
          colours={colours}
        />
      ) : null}
      {after?.weight ? (
        <Balance weight={after.weight} base={base} radius={sphere.radius} which="after" axes={axes} colours={colours} />
      ) : null}
    </Canvas>
  );
}

function Solid({ geometry }: { geometry: BufferGeometry }) {
  return (
    <mesh geometry={geometry}>
      <meshStandardMaterial
        color="#8b8b89"
        roughness={0.82}
        metalness={0}
        side={DoubleSide}
        polygonOffset
        polygonOffsetFactor={1}
        polygonOffsetUnits={1}
      />
    </mesh>
  );
}

interface BalanceProps {
  weight: DrawnWeight;
  base: Three;
  radius: number;
  which: 'before' | 'after';
  axes: boolean;
  colours: TokenColours;
}

/** Centre of mass and axes of one side: a full brass ball after, an open ring before, which stays in sight around the ball. */
function Balance({ weight, base, radius, which, axes, colours }: BalanceProps) {
  const centre = [0, 1, 2].map((i) => weight.centreM[i] - base[i]) as Three;
  const after = which === 'after';
  return (
    <>
      {after ? (
        <mesh position={centre} renderOrder={8}>
          <sphereGeometry args={[radius * 0.018, 20, 14]} />
          <meshBasicMaterial color={colours.brass} depthTest={false} transparent />
        </mesh>
      ) : (
        <Ring position={centre} colour={colours.ink} ground={colours.ground} />
      )}
      {axes ? (
        <PrincipalAxes
          centre={centre}
          quaternion={weight.quatWxyz}
          reach={radius * (after ? 0.72 : 0.58)}
          free={weight.freeAxes}
          mark={after ? '' : '′'}
          colour={after ? colours.ink : colours['ink-3']}
          ground={colours.ground}
        />
      ) : null}
    </>
  );
}

/** Share of the view's height, whatever the distance. */
const RING_SIZE: Three = [0.034, 0.034, 1];

function Ring({ position, colour, ground }: { position: Three; colour: string; ground: string }) {
  const texture = useMemo(() => ringTexture(colour, ground), [colour, ground]);
  return (
    <sprite position={position} scale={RING_SIZE} renderOrder={9}>
      <spriteMaterial map={texture} depthTest={false} sizeAttenuation={false} transparent />
    </sprite>
  );
}

function ringTexture(colour: string, ground: string): CanvasTexture {
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = 64;
  const context = canvas.getContext('2d');
  if (context !== null) {
    for (const [style, width] of [
      [ground, 9],
      [colour, 4.5],
    ] as const) {
      context.beginPath();
      context.arc(32, 32, 24, 0, 2 * Math.PI);
      context.strokeStyle = style;
      context.lineWidth = width;
      context.stroke();
    }
  }
  const texture = new CanvasTexture(canvas);
  texture.colorSpace = SRGBColorSpace;
  return texture;
}

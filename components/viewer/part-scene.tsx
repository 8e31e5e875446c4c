'use client';

import { Canvas, useThree } from '@react-three/fiber';
import { useMemo } from 'react';
import { DoubleSide, type BufferGeometry } from 'three';
import type { TokenColours } from '@/hooks/use-token-colours';
import { equalEllipsoid } from '@/lib/rules/equal-ellipsoid';
import type { UpAxis } from '@/lib/rules/units';
import { EqualSolid } from './equal-solid';
import { Light } from './light';
import { Outline } from './outline';
import { PrincipalAxes } from './principal-axes';
import type { DrawnAsset } from './read-asset-mesh';
import { sphereOf } from './sphere-of';
import { ViewControls } from './view-controls';

/** Mass properties to draw; metres, the asset's axes. */
export interface DrawnWeight {
  massKg: number;
  centreM: readonly [number, number, number];
  momentsKgM2: readonly [number, number, number];
  quatWxyz: readonly [number, number, number, number];
  freeAxes: string;
}

export interface ViewChoices {
  cage: boolean;
  axes: boolean;
  solid: boolean;
  rest: boolean;
}

interface PartSceneProps {
  asset: DrawnAsset;
  part: string;
  weight: DrawnWeight | null;
  choices: ViewChoices;
  up: UpAxis;
  fit: number;
  colours: TokenColours;
}

/** The part's limit surface with what is chosen over it. Everything is drawn relative to the mesh's own origin, so that digits last. */
export default function PartScene({ asset, part, weight, choices, up, fit, colours }: PartSceneProps) {
  const drawn = asset.parts.find((one) => one.name === part) ?? null;
  const rest = choices.rest ? asset.parts.filter((one) => one.name !== part) : [];
  const geometries = useMemo(
    () =>
      asset.parts.flatMap((one) =>
        one.surface !== null && (choices.rest || one.name === part) ? [{ geometry: one.surface }] : [],
      ),
    [asset, part, choices.rest],
  );
  const sphere = useMemo(() => sphereOf(geometries), [geometries]);
  const own = useMemo(() => sphereOf(drawn?.surface ? [{ geometry: drawn.surface }] : []), [drawn]);
  const centre =
    weight === null ? null : ([0, 1, 2].map((i) => weight.centreM[i] - asset.origin[i]) as [number, number, number]);
  const semiAxes = useMemo(
    () => (weight === null ? null : equalEllipsoid(weight.massKg, weight.momentsKgM2)),
    [weight],
  );

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
      {drawn?.surface ? (
        <Surface geometry={drawn.surface} colours={colours} outlined={choices.rest} dimmed={choices.solid} />
      ) : null}
      {rest.map((one) =>
        one.surface === null ? null : (
          <mesh key={one.name} geometry={one.surface}>
            <meshStandardMaterial
              color={colours['ink-3']}
              roughness={0.9}
              transparent
              opacity={0.18}
              depthWrite={false}
              side={DoubleSide}
            />
          </mesh>
        ),
      )}
      {choices.cage && drawn?.cage ? (
        <lineSegments geometry={drawn.cage}>
          <lineBasicMaterial color={colours.edge} transparent opacity={0.9} />
        </lineSegments>
      ) : null}
      {weight !== null && centre !== null ? (
        <>
          <mesh position={centre} renderOrder={8}>
            <sphereGeometry args={[own.radius * 0.022, 20, 14]} />
            <meshBasicMaterial color={colours.brass} depthTest={false} transparent />
          </mesh>
          {choices.axes ? (
            <PrincipalAxes
              centre={centre}
              quaternion={weight.quatWxyz}
              reach={own.radius * 1.02}
              free={weight.freeAxes}
              colour={colours.ink}
              ground={colours.ground}
            />
          ) : null}
          {choices.solid && semiAxes !== null ? (
            <EqualSolid centre={centre} quaternion={weight.quatWxyz} semiAxes={semiAxes} colour={colours.ink} />
          ) : null}
        </>
      ) : null}
    </Canvas>
  );
}

function Surface({
  geometry,
  colours,
  outlined,
  dimmed,
}: {
  geometry: BufferGeometry;
  colours: TokenColours;
  outlined: boolean;
  dimmed: boolean;
}) {
  const size = useThree((state) => state.size);
  return (
    <>
      {outlined ? <Outline geometry={geometry} colour={colours.ink} pixels={size} /> : null}
      <mesh geometry={geometry}>
        <meshStandardMaterial
          color="#9b9b99"
          roughness={0.82}
          metalness={0}
          side={DoubleSide}
          transparent={dimmed}
          opacity={dimmed ? 0.55 : 1}
          depthWrite={!dimmed}
          polygonOffset
          polygonOffsetFactor={1}
          polygonOffsetUnits={1}
        />
      </mesh>
    </>
  );
}

'use client';

import { useMemo } from 'react';
import { BufferGeometry, Float32BufferAttribute, Quaternion } from 'three';

interface EqualSolidProps {
  centre: readonly [number, number, number];
  quaternion: readonly [number, number, number, number];
  /** Along principal axes 1, 2, 3. */
  semiAxes: readonly [number, number, number];
  colour: string;
}

const AROUND = 96;
const RINGS = 4;

/** Great circles and parallels of the unit sphere, as line segments. */
function net(): BufferGeometry {
  const points: number[] = [];
  const ring = (at: (angle: number) => readonly [number, number, number]) => {
    for (let k = 0; k < AROUND; k++) {
      points.push(...at((2 * Math.PI * k) / AROUND), ...at((2 * Math.PI * (k + 1)) / AROUND));
    }
  };
  for (let r = 0; r < RINGS; r++) {
    const turn = (Math.PI * r) / RINGS;
    ring((a) => [Math.cos(a) * Math.cos(turn), Math.sin(a), Math.cos(a) * Math.sin(turn)]);
  }
  for (const height of [-0.5, 0, 0.5]) {
    const radius = Math.sqrt(1 - height * height);
    ring((a) => [radius * Math.cos(a), height, radius * Math.sin(a)]);
  }
  return new BufferGeometry().setAttribute('position', new Float32BufferAttribute(points, 3));
}

/** The solid ellipsoid of equal mass and inertia, as a net over the surface. */
export function EqualSolid({ centre, quaternion: [w, x, y, z], semiAxes, colour }: EqualSolidProps) {
  const lines = useMemo(() => net(), []);
  const rotation = useMemo(() => new Quaternion(x, y, z, w), [w, x, y, z]);
  return (
    <group position={[...centre]} quaternion={rotation} scale={[...semiAxes]}>
      <lineSegments geometry={lines}>
        <lineBasicMaterial color={colour} transparent opacity={0.75} />
      </lineSegments>
      <lineSegments geometry={lines} renderOrder={4}>
        <lineBasicMaterial color={colour} transparent opacity={0.2} depthTest={false} />
      </lineSegments>
    </group>
  );
}

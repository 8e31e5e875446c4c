'use client';

import { useMemo } from 'react';
import { BufferGeometry, CanvasTexture, Float32BufferAttribute, Quaternion, SRGBColorSpace } from 'three';

interface PrincipalAxesProps {
  centre: readonly [number, number, number];
  /** Rotates principal axes into the asset's axes, w first. */
  quaternion: readonly [number, number, number, number];
  /** Half the length drawn, the same for all three. */
  reach: number;
  /** Axes that could as well lie elsewhere in their plane are broken lines. */
  free: string;
  /** Set behind each number, to tell two sets of axes apart. */
  mark?: string;
  colour: string;
  ground: string;
}

const DIRECTIONS = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
] as const;

/** The three principal axes through the centre of mass, neutral in colour and told apart by their numbers. */
export function PrincipalAxes({
  centre,
  quaternion: [w, x, y, z],
  reach,
  free,
  mark = '',
  colour,
  ground,
}: PrincipalAxesProps) {
  const rotation = useMemo(() => new Quaternion(x, y, z, w), [w, x, y, z]);
  return (
    <group position={[...centre]} quaternion={rotation}>
      {DIRECTIONS.map((direction, index) => (
        <Axis
          key={index}
          direction={direction}
          label={`${index + 1}${mark}`}
          reach={reach}
          free={free.includes(String(index + 1))}
          colour={colour}
          ground={ground}
        />
      ))}
    </group>
  );
}

/** Share of the view's height, whatever the distance. */
const LABEL_SIZE: [number, number, number] = [0.024, 0.024, 1];

interface AxisProps {
  direction: readonly [number, number, number];
  label: string;
  reach: number;
  free: boolean;
  colour: string;
  ground: string;
}

function Axis({ direction, label: text, reach, free, colour, ground }: AxisProps) {
  const geometry = useMemo(() => lineGeometry(direction, reach, free), [direction, reach, free]);
  const label = useMemo(() => labelTexture(text, colour, ground), [text, colour, ground]);
  return (
    <>
      <lineSegments geometry={geometry}>
        <lineBasicMaterial color={colour} />
      </lineSegments>
      <lineSegments geometry={geometry} renderOrder={5}>
        <lineBasicMaterial color={colour} transparent opacity={0.4} depthTest={false} />
      </lineSegments>
      <sprite
        position={[direction[0] * reach * 1.1, direction[1] * reach * 1.1, direction[2] * reach * 1.1]}
        scale={LABEL_SIZE}
        renderOrder={6}
      >
        <spriteMaterial map={label} depthTest={false} sizeAttenuation={false} transparent />
      </sprite>
    </>
  );
}

/** From −reach to +reach; a free axis in 24 strokes. */
function lineGeometry(direction: readonly [number, number, number], reach: number, broken: boolean): BufferGeometry {
  const strokes = broken ? 24 : 1;
  const share = broken ? 0.55 : 1;
  const positions = Array.from({ length: strokes }, (_, index) => {
    const from = -reach + (2 * reach * index) / strokes;
    const to = from + (2 * reach * share) / strokes;
    return [from, to].flatMap((at) => direction.map((part) => part * at));
  });
  return new BufferGeometry().setAttribute('position', new Float32BufferAttribute(positions.flat(), 3));
}

function labelTexture(text: string, colour: string, ground: string): CanvasTexture {
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = 64;
  const context = canvas.getContext('2d');
  if (context !== null) {
    context.font = `500 44px ${getComputedStyle(document.body).fontFamily}`;
    context.textAlign = 'center';
    context.textBaseline = 'middle';
    context.lineWidth = 6;
    context.lineJoin = 'round';
    context.strokeStyle = ground;
    context.strokeText(text, 32, 34);
    context.fillStyle = colour;
    context.fillText(text, 32, 34);
  }
  const texture = new CanvasTexture(canvas);
  texture.colorSpace = SRGBColorSpace;
  return texture;
}

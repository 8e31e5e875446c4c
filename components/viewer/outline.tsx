'use client';

import { useMemo } from 'react';
import { BackSide, Color, ShaderMaterial, type BufferGeometry } from 'three';

const VERTEX = `
  uniform float width;
  uniform vec2 pixels;
  void main() {
    vec4 at = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
    vec3 outwards = normalize(normalMatrix * normal);
    vec2 way = normalize((projectionMatrix * vec4(outwards, 0.0)).xy + 1e-6);
    at.xy += way * width * 2.0 * at.w / pixels;
    gl_Position = at;
  }
`;
const FRAGMENT = `
  uniform vec3 colour;
  void main() {
    gl_FragColor = vec4(colour, 1.0);
    #include <colorspace_fragment>
  }
`;

interface OutlineProps {
  geometry: BufferGeometry;
  colour: string;
  /** Size of the drawing in pixels. */
  pixels: { width: number; height: number };
}

/** The selection: the surface's rim, two pixels wide whatever the distance, drawn behind the surface itself. */
export function Outline({ geometry, colour, pixels }: OutlineProps) {
  const material = useMemo(
    () =>
      new ShaderMaterial({
        vertexShader: VERTEX,
        fragmentShader: FRAGMENT,
        side: BackSide,
        uniforms: {
          width: { value: 2 },
          pixels: { value: [pixels.width, pixels.height] },
          colour: { value: new Color(colour) },
        },
      }),
    [colour, pixels.width, pixels.height],
  );
  return <mesh geometry={geometry} material={material} />;
}

'use client';

import { useMemo } from 'react';
import { Color, DoubleSide, FrontSide, ShaderMaterial, type BufferGeometry } from 'three';

const VERTEX = `
  varying vec3 outwards;
  varying vec3 towards;
  void main() {
    vec4 at = modelViewMatrix * vec4(position, 1.0);
    outwards = normalize(normalMatrix * normal);
    towards = normalize(-at.xyz);
    gl_Position = projectionMatrix * at;
  }
`;
const FRAGMENT = `
  uniform vec3 colour;
  uniform float strength;
  varying vec3 outwards;
  varying vec3 towards;
  void main() {
    float rim = 1.0 - abs(dot(normalize(outwards), normalize(towards)));
    gl_FragColor = vec4(colour, strength * rim * rim * rim);
    #include <colorspace_fragment>
  }
`;

/** A surface as a ghost: clear where it is looked at straight, drawn where it turns away. What lies inside the solid shows through, fainter. */
export function Ghost({ geometry, colour }: { geometry: BufferGeometry; colour: string }) {
  const outside = useMemo(() => ghostMaterial(colour, 0.9, true), [colour]);
  const inside = useMemo(() => ghostMaterial(colour, 0.18, false), [colour]);
  return (
    <>
      <mesh geometry={geometry} material={outside} renderOrder={3} />
      <mesh geometry={geometry} material={inside} renderOrder={2} />
    </>
  );
}

function ghostMaterial(colour: string, strength: number, depthTest: boolean): ShaderMaterial {
  return new ShaderMaterial({
    vertexShader: VERTEX,
    fragmentShader: FRAGMENT,
    uniforms: { colour: { value: new Color(colour) }, strength: { value: strength } },
    transparent: true,
    depthWrite: false,
    depthTest,
    // Through the solid the near side alone, or its own far side would cloud it.
    side: depthTest ? DoubleSide : FrontSide,
  });
}

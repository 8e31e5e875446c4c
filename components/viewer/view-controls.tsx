'use client';

import { useThree } from '@react-three/fiber';
import { useEffect } from 'react';
import { PerspectiveCamera, Vector3 } from 'three';
import { OrbitControls } from 'three-stdlib';
import type { UpAxis } from '@/lib/rules/units';

interface ViewControlsProps {
  centre: readonly [number, number, number];
  radius: number;
  up: UpAxis;
  /** Raised to bring the whole part into view again. */
  fit: number;
}

const TURN = Math.PI / 12;

/** Turning, moving and nearing by pointer or by the arrow keys; frames are drawn only when something moves. */
export function ViewControls({ centre, radius, up, fit }: ViewControlsProps) {
  const { camera, gl, invalidate } = useThree();
  const [x, y, z] = centre;

  useEffect(() => {
    if (!(camera instanceof PerspectiveCamera)) return;
    const target = new Vector3(x, y, z);
    standBefore(camera, target, radius, up);

    const controls = new OrbitControls(camera, gl.domElement);
    controls.target.copy(target);
    controls.enableDamping = false;
    controls.update();
    const onChange = () => invalidate();
    controls.addEventListener('change', onChange);

    const element = gl.domElement.closest<HTMLElement>('[data-viewer]');
    const onKey = (event: KeyboardEvent) => {
      const turns: Record<string, [number, number]> = {
        ArrowLeft: [-1, 0],
        ArrowRight: [1, 0],
        ArrowUp: [0, -1],
        ArrowDown: [0, 1],
      };
      const turn = turns[event.key];
      if (turn === undefined) return;
      event.preventDefault();
      controls.setAzimuthalAngle(controls.getAzimuthalAngle() + turn[0] * TURN);
      controls.setPolarAngle(Math.min(Math.PI - 0.01, Math.max(0.01, controls.getPolarAngle() + turn[1] * TURN)));
      controls.update();
      invalidate();
    };
    element?.addEventListener('keydown', onKey);
    invalidate();
    return () => {
      element?.removeEventListener('keydown', onKey);
      controls.removeEventListener('change', onChange);
      controls.dispose();
    };
  }, [camera, gl, invalidate, x, y, z, radius, up, fit]);

  return null;
}

/** Puts the camera where a ball of that radius fills the view, seen from the front and a little from above and aside. */
function standBefore(camera: PerspectiveCamera, target: Vector3, radius: number, up: UpAxis): void {
  const distance = (radius / Math.sin(((camera.fov / 2) * Math.PI) / 180)) * 1.1;
  const from = up === 'y' ? new Vector3(0.62, 0.42, 1) : new Vector3(0.62, -1, 0.42);
  camera.up.set(0, up === 'y' ? 1 : 0, up === 'z' ? 1 : 0);
  camera.position.copy(target).addScaledVector(from.normalize(), distance);
  camera.near = distance / 200;
  camera.far = distance * 20;
  camera.updateProjectionMatrix();
}

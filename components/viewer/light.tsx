'use client';

import { useThree } from '@react-three/fiber';

/** Neutral light that comes along with the eye, so that no side is ever dark. */
export function Light() {
  const camera = useThree((state) => state.camera);
  return (
    <>
      <hemisphereLight intensity={1.1} groundColor="#777777" />
      <primitive object={camera}>
        <directionalLight position={[0.6, 0.8, 1]} intensity={1.7} />
      </primitive>
    </>
  );
}

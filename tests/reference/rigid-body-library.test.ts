import RAPIER from '@dimforge/rapier3d-compat';
import { beforeAll, describe, expect, it } from 'vitest';
import { massProperties, type MassProperties } from '@/lib/engine/mass-properties';
import { measureCage } from '@/lib/engine/measure';
import { CATMULL_CLARK, moved, referenceCage } from '../support/engine-cages';

/**
 * The outside check of mass frames: the rigid-body library rapier (npm @dimforge/rapier3d-compat, 32-bit floats) is given mass, centre of mass,
 * principal moments and the frame's quaternion, and must come to the inertia matrix that was never given to it.
 */
const SINGLE = 4e-6;

beforeAll(() => RAPIER.init());

type Frame = Pick<MassProperties, 'massKg' | 'comM' | 'principalKgM2' | 'quatWxyz'>;

function bodyOf(frame: Frame): { world: RAPIER.World; body: RAPIER.RigidBody } {
  const world = new RAPIER.World({ x: 0, y: 0, z: 0 });
  const [w, x, y, z] = frame.quatWxyz;
  const xyz = ([a, b, c]: readonly number[]): { x: number; y: number; z: number } => ({ x: a, y: b, z: c });
  const body = world.createRigidBody(RAPIER.RigidBodyDesc.dynamic().setAdditionalMassProperties(frame.massKg, xyz(frame.comM), xyz(frame.principalKgM2), { w, x, y, z }));
  world.step();
  return { world, body };
}

/** Their inertia matrix about the centre of mass in world axes: xx, yy, zz, xy, xz, yz. */
function worldInertia(frame: Frame): number[] {
  const { world, body } = bodyOf(frame);
  const m = body.effectiveAngularInertia();
  const entries = [m.m11, m.m22, m.m33, m.m12, m.m13, m.m23];
  world.free();
  return entries;
}

const weighed = new Map<string, MassProperties>();

/** A cage whose principal axes lie skew to everything. */
function weigh(file: string): MassProperties {
  const known = weighed.get(file);
  if (known) return known;
  const r = [[0.36, 0.48, -0.8], [-0.8, 0.6, 0], [0.48, 0.64, 0.6]];
  const cage = moved(referenceCage(file), (x, y, z) => [
    r[0][0] * x + 1.5 * r[0][1] * y + 0.6 * r[0][2] * z + 2, r[1][0] * x + 1.5 * r[1][1] * y + 0.6 * r[1][2] * z - 1, r[2][0] * x + 1.5 * r[2][1] * y + 0.6 * r[2][2] * z + 0.5,
  ]);
  const { components } = measureCage(cage, CATMULL_CLARK).parts[0];
  const result = massProperties({ components, metresPerUnit: 1, scale: 1, construction: 'solid', densityKgPerM3: 1000 });
  if (!result.ok) throw new Error(result.message);
  weighed.set(file, result);
  return result;
}

const worst = (found: readonly number[], wanted: readonly number[]): number => Math.max(...wanted.map((value, i) => Math.abs(found[i] - value))) / Math.max(...wanted.map(Math.abs));

describe.each(['brick.obj', 'spot.obj', 'brick_3sharp.obj', 'pyramid_quad.obj'])('%s', (file) => {
  it('mass, centre and frame give the library our inertia matrix', () => {
    const ours = weigh(file);
    expect(worst(worldInertia(ours), ours.inertiaKgM2)).toBeLessThan(SINGLE);
    const { world, body } = bodyOf(ours);
    const com = body.worldCom();
    expect(body.mass() / ours.massKg).toBeCloseTo(1, 6);
    expect(worst([com.x, com.y, com.z], ours.comM)).toBeLessThan(SINGLE);
    world.free();
  });

  it('a quaternion that turns the other way round does not pass', () => {
    const ours = weigh(file);
    const [w, x, y, z] = ours.quatWxyz;
    expect(worst(worldInertia({ ...ours, quatWxyz: [w, -x, -y, -z] }), ours.inertiaKgM2)).toBeGreaterThan(100 * SINGLE);
  });

  it('a blow about an axis turns it as our matrix says: I ω = L', () => {
    const ours = weigh(file);
    const [ixx, iyy, izz, ixy, ixz, iyz] = ours.inertiaKgM2;
    for (const blow of [[1, 0, 0], [0, 1, 0], [0.3, -0.5, 0.8]]) {
      const { world, body } = bodyOf(ours);
      const scale = ixx + iyy + izz;
      body.applyTorqueImpulse({ x: blow[0] * scale, y: blow[1] * scale, z: blow[2] * scale }, true);
      const { x, y, z } = body.angvel();
      const momentum = [ixx * x + ixy * y + ixz * z, ixy * x + iyy * y + iyz * z, ixz * x + iyz * y + izz * z].map((value) => value / scale);
      expect(worst(momentum, blow)).toBeLessThan(5 * SINGLE);
      world.free();
    }
  });
});

import type { MassProperties } from '@/lib/engine/mass-properties';
import type { ComparedNumbers } from '@/lib/rules/comparison';

/** Mass properties under the names that are compared, with the box around them (m: min xyz, max xyz). */
export function toComparedNumbers(properties: MassProperties, boundsM: number[] | null): ComparedNumbers {
  const [comX, comY, comZ] = properties.comM;
  const [ixx, iyy, izz, ixy, ixz, iyz] = properties.inertiaKgM2;
  const [i1, i2, i3] = properties.principalKgM2;
  const [w, x, y, z] = properties.quatWxyz;
  return {
    mass_kg: properties.massKg,
    com_x_m: comX, com_y_m: comY, com_z_m: comZ,
    ixx_kg_m2: ixx, iyy_kg_m2: iyy, izz_kg_m2: izz, ixy_kg_m2: ixy, ixz_kg_m2: ixz, iyz_kg_m2: iyz,
    i1_kg_m2: i1, i2_kg_m2: i2, i3_kg_m2: i3,
    axes_quat_w: w, axes_quat_x: x, axes_quat_y: y, axes_quat_z: z,
    free_axes: properties.freeAxes,
    bounds_m: boundsM,
  };
}

import { expect } from 'vitest';
import { approveValues } from '@/lib/approvals/approve-values';
import { lockValues } from '@/lib/locks/lock-values';
import { setValues } from '@/lib/settings/set-values';
import { putShots } from '@/lib/shots/put-shots';
import { createCast, type Cast } from './cast';
import { asOwner } from './database';
import { boxPart, putCage } from './put-cage';

const BODY = { asset: 'crate', part: 'body' };

/** A show in metres with a crate of two boxes, whose body weighs 24 kg by the td's density, in the shots fer_0010 and fer_0020. */
export async function createCrateShow(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCrate(cast, 2);
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ ...BODY, revision: 1, density_kg_m3: 1 }] });
  await putShots(cast.contextOf('lead'), { show: cast.show.code, items: ['fer_0010', 'fer_0020'].map((code) => ({ code, sequence: 'fer', assets: ['crate'] })) });
  return cast;
}

/** Another version of the crate, by the td: its body is `width` m wide, 3 m high and 4 m deep; its lid is a cube. */
export function putCrate(cast: Cast, width: number): Promise<string> {
  return putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [width, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
}

export interface BodyNow {
  partId: string;
  state: string;
  revision: number;
  valueId: string | null;
  valueSha256: string;
  massKg: number;
}

/** The body's row as it is. */
export async function bodyNow(cast: Cast): Promise<BodyNow> {
  const [row] = await asOwner<BodyNow>(
    `select part_id as "partId", state, revision, value_id as "valueId", value_sha256 as "valueSha256", mass_kg as "massKg" from part_current where show_id = $1 and part = 'body'`,
    [cast.show.id],
  );
  return row;
}

/** Sets the body's density as the td. */
export async function setDensity(cast: Cast, density: number): Promise<void> {
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ ...BODY, revision: (await bodyNow(cast)).revision, density_kg_m3: density }] });
}

/** Approves the body's value as the lead; answers its value_id. */
export async function approveBody(cast: Cast): Promise<string> {
  const { valueSha256 } = await bodyNow(cast);
  const { items } = await approveValues(cast.contextOf('lead'), { show: cast.show.code, items: [{ ...BODY, value_sha256: valueSha256 }], carry_over: false });
  expect(items).toHaveLength(1);
  return items[0].value_id;
}

/** Locks a value of the body in a shot as the lead; answers the lock. */
export async function lockBody(cast: Cast, valueId: string, shot = 'fer_0010'): Promise<string> {
  const { items } = await lockValues(cast.contextOf('lead'), { show: cast.show.code, shot, items: [{ ...BODY, value_id: valueId, copy: '' }] });
  return items[0].lock;
}

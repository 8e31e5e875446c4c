import { and, eq, inArray } from 'drizzle-orm';
import { partCurrent } from '@/db/schema/part-current';
import { shows } from '@/db/schema/shows';
import type { ActorContext } from '@/lib/context';
import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import { setValues } from '@/lib/settings/set-values';

type Values = Omit<SetValuesItem, 'asset' | 'part' | 'body' | 'revision'>;

interface MassRule {
  asset: RegExp;
  part: RegExp;
  values: Values;
}

const rule = (asset: string, part: string, values: Values): MassRule => ({ asset: new RegExp(`^(${asset})$`), part: new RegExp(`^(${part})$`), values });
const of = (material: string): Values => ({ material });

const KERATIN = of('Horn / hoof (keratin, dry)');
const FLESH = of('Soft tissue, average (male)');
const OAK = of('White oak');

/**
 * What the crew has set so far; the first rule that fits a part counts, and parts without one have no mass yet. Of the ox
 * only hooves and horns are set: that it weighs 640 kg is the first thing to do.
 */
const RULES: readonly MassRule[] = [
  rule('tarnOx|oxCalf', '(fore)?hoof_.|horn_.', KERATIN),
  rule('oxCalf', '(?!tail).*', FLESH),
  rule('bellToad', 'eye_.', of('Eye lens')),
  rule('bellToad', 'throat', { density_kg_m3: 620 }),
  rule('bellToad', '.*', of('Skeletal muscle')),
  rule('heronHag', '(upper|fore|hand)Wing_.|tail', of('Feather vane, bulk incl. air')),
  rule('heronHag', 'beak', KERATIN),
  rule('heronHag', '(?!foot_).*', FLESH),
  rule('millRat', '(?!tail|shin_R).*', FLESH),
  rule('eelKing', 'crown', of('Gold')),
  rule('eelKing', '(?!fin_).*', of('Skeletal muscle')),
  rule('ferrywoman', '.*', of('Whole living body (person)')),
  rule('ringer', '(?!hand_|foot_).*', of('Whole living body (person)')),
  rule('ferryCloak', '.*', { construction: 'sheet', material: 'Wool coating / felt 3 mm' }),
  rule('ringerCoat', 'belt', of('Leather, dry')),
  rule('ringerCoat', '(?!collar).*', of('Felt, wool')),
  rule('oxHarness', 'yoke', of('White ash')),
  rule('oxHarness', '(?!bridle).*', of('Leather, dry')),
  rule('oxBarding', 'hornCap_.', of('Brass (yellow)')),
  rule('oxBarding', '.*', of('Mild steel')),
  rule('sledge', 'deck', { target_mass_kg: 4.1 }),
  rule('sledge', 'runners', { target_mass_kg: 2.4 }),
  rule('raft', 'beam_.*', OAK),
  rule('raft', '.*', of('Douglas-fir, coast')),
  rule('bell', 'headstock', OAK),
  rule('bell', '.*', of('Bronze (tin)')),
  rule('clapper', '.*', of('Cast iron, grey')),
  rule('lantern', 'glass', of('Plate glass (soda-lime)')),
  rule('lantern', '(?!ring).*', of('Brass (yellow)')),
  rule('bucket', 'bail', of('Mild steel')),
  rule('bucket', 'water', { material: 'Water, fresh 4 C', variant: 'full' }),
  rule('bucket', '.*', OAK),
  rule('oar', '.*', of('White ash')),
  rule('churn', 'churn', of('American beech')),
  rule('rope', '.*', { target_mass_kg: 3.2 }),
  rule('millWheel', 'axle|hub', of('Cast iron, grey')),
  rule('millWheel', '(?!paddles_).*', OAK),
  rule('arch', '.*', of('Limestone')),
  rule('bridge', 'abutment_.*|pier_.', of('Granite')),
  rule('bridge', 'deck_.', OAK),
  rule('sign', 'post', OAK),
  rule('boulders', '.*', of('Granite')),
];

/** Sets the crew's masses on the show's parts as they are now, by the verb that the table uses. Answers how many were set. */
export async function seedMasses(context: ActorContext, show: string): Promise<number> {
  const rows = await context.db
    .select({ asset: partCurrent.asset, part: partCurrent.part, revision: partCurrent.revision })
    .from(partCurrent)
    .innerJoin(shows, eq(shows.id, partCurrent.showId))
    .where(and(eq(shows.code, show), inArray(partCurrent.state, ['unset', 'blocked'])));
  const items = rows.flatMap((row): SetValuesItem[] => {
    const found = RULES.find((one) => one.asset.test(row.asset) && one.part.test(row.part));
    return found ? [{ asset: row.asset, part: row.part, revision: row.revision, ...found.values }] : [];
  });
  if (items.length > 0) await setValues(context, { show, items });
  return items.length;
}

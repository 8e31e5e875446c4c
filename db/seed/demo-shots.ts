import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import { auditEvents } from '@/db/schema/audit-events';
import { locks } from '@/db/schema/locks';
import { partCurrent } from '@/db/schema/part-current';
import { receipts } from '@/db/schema/receipts';
import { shotOverrides } from '@/db/schema/shot-overrides';
import { shots } from '@/db/schema/shots';
import { approveValues } from '@/lib/approvals/approve-values';
import { askForApproval } from '@/lib/approvals/ask-for-approval';
import type { ActorContext } from '@/lib/context';
import { exportShotAs } from '@/lib/exports/export-shot';
import { lockShots } from '@/lib/locks/lock-shots';
import { relockValues } from '@/lib/locks/relock-values';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import { setValues } from '@/lib/settings/set-values';
import { putShots } from '@/lib/shots/put-shots';

const shot = (code: string, title: string, ...assets: PutShotsInput['items'][number]['assets']): PutShotsInput['items'][number] => ({ code, sequence: code.slice(0, 3), title, assets });

/** Ferry, mill and bell: three sequences. */
const SHOTS: PutShotsInput['items'] = [
  shot('fer_0010', 'The raft waits', 'raft', 'oar', 'lantern', 'ferryCloak'),
  shot('fer_0020', 'The ox is led down', 'tarnOx', 'oxHarness', 'sledge'),
  shot('fer_0030', 'The ox balks', 'tarnOx', 'oxHarness', 'sledge'),
  shot('fer_0040', 'The ox steps aboard', 'tarnOx', 'oxHarness', 'raft'),
  shot('fer_0050', 'Calf and cow', 'tarnOx', 'oxCalf'),
  shot('fer_0060', 'Across the tarn', 'tarnOx', 'raft', 'oar', { asset: 'lantern', copies: 2 }),
  shot('mil_0010', 'Rats on the wheel', 'millWheel', { asset: 'millRat', copies: 3 }),
  shot('mil_0020', 'The sledge breaks through', 'sledge', 'boulders'),
  shot('mil_0030', 'The miller’s yard', 'churn', 'bucket', 'sign'),
  shot('bel_0010', 'The rope goes taut', 'bell', 'clapper', 'rope'),
  shot('bel_0020', 'The bell rises', 'bell', 'clapper', 'arch'),
  shot('bel_0030', 'Toad and heron', 'bell', { asset: 'bellToad', copies: 2 }, 'heronHag'),
];

const APPROVED = ['tarnOx', 'oxHarness', 'oxBarding', 'sledge', 'raft', 'oar', 'lantern', 'ferryCloak', 'ringerCoat', 'bell', 'clapper', 'rope', 'arch', 'bridge', 'millWheel', 'churn', 'boulders'];
const ASKED = ['heronHag', 'oxCalf'];
const LOCKED = ['fer_0010', 'fer_0060', 'mil_0020', 'bel_0010', 'bel_0020'];
const TAKEN = ['fer_0010', 'fer_0020', 'bel_0010'];

interface Crew {
  td: ActorContext;
  lead: ActorContext;
  artist: ActorContext;
}

/**
 * Shots, approvals, locks, an override, downloads and two later changes, in the order in which a crew would do them and by the verbs
 * of the product. A step whose act stands in the history already is left out, so that running it again changes nothing. Answers how
 * many steps were done.
 */
export async function seedShots({ td, lead, artist }: Crew, showId: string, show: string): Promise<number> {
  const { db } = td;
  let done = 0;
  const counted = (act: string) => db.$count(auditEvents, and(eq(auditEvents.showId, showId), eq(auditEvents.act, act)));
  const step = async (held: number, wanted: number, run: () => Promise<unknown>): Promise<void> => {
    if (held >= wanted) return;
    await run();
    done++;
  };
  const valuesOf = async (assets: readonly string[]) => {
    const rows = await db
      .select({ asset: partCurrent.asset, part: partCurrent.part, sha: partCurrent.valueSha256, revision: partCurrent.revision, valueId: partCurrent.valueId })
      .from(partCurrent)
      .where(and(eq(partCurrent.showId, showId), inArray(partCurrent.asset, [...assets]), sql`${partCurrent.valueSha256} is not null`));
    return rows.map(({ sha, ...row }) => ({ ...row, value_sha256: sha ?? '' }));
  };
  const named = (rows: Awaited<ReturnType<typeof valuesOf>>) => rows.map(({ asset, part, value_sha256 }) => ({ asset, part, value_sha256 }));
  const revisionOf = async (asset: string, part: string) => (await valuesOf([asset])).find((row) => row.part === part)?.revision ?? 1;

  await step(await counted('put-shots'), 1, () => putShots(td, { show, items: SHOTS }));
  await step(await counted('approve-values'), 1, async () => approveValues(lead, { show, items: named(await valuesOf(APPROVED)), note: 'Seen on the turntable', carry_over: false }));
  await step(await counted('ask-for-approval'), 1, async () => askForApproval(td, { show, items: named(await valuesOf(ASKED)), note: 'Ready for the bell sequence', take_back: false }));
  // Deck and runners weigh 6.5 kg together; with this deck the sledge weighs 14 kg.
  await step(await counted('draft-override'), 1, async () =>
    setValues(artist, { show, items: [{ asset: 'sledge', part: 'deck', revision: await revisionOf('sledge', 'deck'), target_mass_kg: 11.6, shot: 'mil_0020', reason: 'Heavier here: 14 kg in all instead of 6.5, so that the ice gives way' }] }),
  );
  await step(await counted('approve-values'), 2, async () => {
    const [override] = await db
      .select({ sha: shotOverrides.valueSha256 })
      .from(shotOverrides)
      .innerJoin(shots, eq(shots.id, shotOverrides.shotId))
      .where(and(eq(shots.showId, showId), eq(shots.code, 'mil_0020'), isNull(shotOverrides.droppedAt)));
    if (override?.sha) await approveValues(lead, { show, items: [{ asset: 'sledge', part: 'deck', value_sha256: override.sha, shot: 'mil_0020' }], carry_over: false });
  });
  await step(await counted('lock-values'), 1, () => lockShots(lead, { show, shots: ['fer_0020', 'fer_0030', 'fer_0040'], asset: 'tarnOx' }));
  await step(await counted('lock-values'), 2, () => lockShots(lead, { show, shots: LOCKED }));
  await step(await db.$count(receipts, eq(receipts.showId, showId)), 1, async () => {
    const pull = exportShotAs('csv');
    for (const code of TAKEN) await pull(artist, { show, shot: code, guard: '1' }, new Request('http://127.0.0.1/'));
  });
  // The oar is weighed again and approved again, the rope weighed again only: one can be re-locked, the other cannot yet.
  await step(await counted('set-values'), 2, async () =>
    setValues(td, {
      show,
      items: [
        { asset: 'rope', part: 'rope', revision: await revisionOf('rope', 'rope'), target_mass_kg: 3.9 },
        { asset: 'oar', part: 'oar', revision: await revisionOf('oar', 'oar'), target_mass_kg: 3.1 },
      ],
    }),
  );
  const [oar] = await valuesOf(['oar']);
  await step(await counted('approve-values'), 3, () => approveValues(lead, { show, items: named([oar]), note: 'As weighed', carry_over: false }));
  await step(await counted('unlock-values'), 1, async () => {
    const [held] = await db
      .select({ id: locks.id })
      .from(locks)
      .innerJoin(shots, eq(shots.id, locks.shotId))
      .innerJoin(partCurrent, eq(partCurrent.partId, locks.partId))
      .where(and(eq(shots.showId, showId), eq(shots.code, 'fer_0010'), eq(partCurrent.asset, 'oar'), isNull(locks.unlockedAt)));
    const [{ valueId }] = await valuesOf(['oar']);
    if (held && valueId) await relockValues(lead, { show, items: [{ lock: held.id, value_id: valueId }], reason: 'The oar as it was weighed' });
  });
  return done;
}

import { desc, eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { compareNumbers } from '@/lib/approvals/compare-with-approvals';
import { toDifferencesAnswer } from '@/lib/approvals/to-differences-answer';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { getCurrentAsset } from '@/lib/parts/get-current-asset';
import type { ComparedSide, ComparisonAnswer } from '@/lib/rules/comparison';
import type { GetComparisonInput } from '@/lib/rules/inputs/get-comparison';
import { StudioError } from '@/lib/rules/studio-error';
import { isWithinTolerance, verdictWords } from '@/lib/rules/verdict';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess, type Show } from '@/lib/shows/get-show-access';
import { approvedValues, lockedValue, overrideValue, valuesOfVersion, type PartValue } from './compared-sides';
import { mergePartValues } from './merge-part-values';

interface Subject {
  assetId: string;
  asset: string;
  part: string | null;
  scale: number;
  /** Newest first. */
  versions: { id: string; label: string }[];
  lock: FoundLock | null;
  /** The lock's, or that of the override asked for. */
  shot: { id: string; code: string } | null;
}

interface FoundLock extends Record<string, unknown> {
  id: string;
  shot_id: string;
  shot: string;
  copy: string;
  asset: string;
  part: string;
}

/**
 * Two values of a part, or of an asset's parts together, with their differences: `a` before, `b` after. Without `a` it is the last
 * standing approval, or where there is none the version before the current one; without `b` what is current. With a shot its override
 * stands against the part's own value.
 * Errors: bad_input, not_found for an asset, part, version or lock that the show does not have.
 */
export async function getComparison(context: Context, input: GetComparisonInput): Promise<ComparisonAnswer> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const subject = await findSubject(db, show, input);
  const approved = await approvedValues(db, subject.assetId, subject.part);
  const [current] = subject.versions;
  const previous = subject.versions[1] ?? current;
  const usual = input.shot !== undefined ? 'current' : approved.length > 0 ? 'approved' : previous.label;
  const before = subject.lock ? await lockSide(db, subject, subject.lock) : await sideOf(db, subject, approved, input.a ?? usual);
  const after = await sideOf(db, subject, approved, input.b ?? (input.shot === undefined ? 'current' : 'override'));
  const differences = before.numbers && after.numbers ? compareNumbers(before.numbers, after.numbers) : null;
  const box = before.numbers?.bounds_m ?? null;
  return {
    asset: subject.asset,
    part: subject.part,
    before,
    after,
    verdict: differences ? verdictWords(differences, show.linearUnit) : missingWords(before, after),
    beyond_tolerance: differences && !isWithinTolerance(differences, show),
    differences: differences && toDifferencesAnswer(differences),
    size_m: box && Math.hypot(box[3] - box[0], box[4] - box[1], box[5] - box[2]),
    tolerances: { mass_percent: show.toleranceMassPercent, com_percent: show.toleranceComPercent, moments_percent: show.toleranceMomentsPercent },
    parts: await partNames(db, subject.assetId),
    versions: subject.versions.map((version) => version.label),
    has_approval: approved.length > 0,
    lock: subject.lock && { id: subject.lock.id, shot: subject.lock.shot, copy: subject.lock.copy || null },
  };
}

/** Why nothing is compared: which side has no value. */
function missingWords(before: ComparedSide, after: ComparedSide): string {
  if (before.numbers) return 'no value after';
  return after.numbers ? 'no value before' : 'no value to compare';
}

async function findSubject(db: Executor, show: Show, input: GetComparisonInput): Promise<Subject> {
  const lock = input.lock === undefined ? null : await getLock(db, show.id, input.lock);
  const { asset } = await getCurrentAsset(db, show.id, lock?.asset ?? input.asset ?? '');
  const versions = await db
    .select({ id: assetVersions.id, label: assetVersions.label })
    .from(assetVersions)
    .where(eq(assetVersions.assetId, asset.id))
    .orderBy(desc(assetVersions.number), desc(assetVersions.take));
  let part = lock?.part ?? input.part ?? null;
  if (part !== null && !lock) {
    const { rows } = await db.execute<{ name: string }>(sql`
      select p.name from parts n join parts p on p.id = coalesce(n.merged_into, n.id) where n.asset_id = ${asset.id} and n.name = ${part}`);
    if (rows.length > 0) part = rows[0].name;
    else throw new StudioError('not_found', `${asset.code} has no part ${part}.`);
  }
  const shot = lock ? { id: lock.shot_id, code: lock.shot } : input.shot === undefined ? null : await findShot(db, show.id, input.shot);
  return { assetId: asset.id, asset: asset.code, part, scale: asset.scale, versions, lock, shot };
}

async function getLock(db: Executor, showId: string, id: string): Promise<FoundLock> {
  const { rows } = await db.execute<FoundLock>(sql`
    select l.id, s.id as shot_id, s.code as shot, l.copy, a.asset, p.name as part from locks l join shots s on s.id = l.shot_id join approvals a on a.id = l.approval_id join parts p on p.id = l.part_id
    where l.id = ${id} and l.show_id = ${showId}`);
  if (rows.length === 0) throw new StudioError('not_found', `There is no lock ${id} in this show.`);
  return rows[0];
}

async function sideOf(db: Executor, subject: Subject, approved: PartValue[], ref: string): Promise<ComparedSide> {
  const [current] = subject.versions;
  if (ref === 'approved') {
    const version = approved.length === 1 ? approved[0].version : null;
    return toSide(subject, approved, { ref, name: 'the last approval', version: version ?? current.label, about: version ? `Approved with ${version}.` : 'Approved, each part as it last was.', missing: 'Nothing is approved.' });
  }
  const { shot, part } = subject;
  const asked = ref === 'override' || (ref === 'current' && subject.lock !== null);
  const override = asked && shot && part !== null ? await overrideValue(db, shot.id, subject.assetId, part) : [];
  if (override.length > 0) return toSide(subject, override, { ref, name: `the override in ${shot?.code}`, version: override[0].version, about: `Override as it stands, with ${override[0].version}.`, missing: '' });
  if (ref === 'override') throw new StudioError('not_found', `${part} has no override in ${shot?.code ?? 'this shot'}.`);
  const version = ref === 'current' ? current : subject.versions.find((one) => one.label === ref);
  if (!version) throw new StudioError('not_found', `${subject.asset} has no version ${ref}.`);
  const values = await valuesOfVersion(db, subject.assetId, version.id, subject.part);
  const isCurrent = version.id === current.id;
  return toSide(subject, values, {
    ref,
    name: ref === 'current' ? `current ${version.label}` : version.label,
    version: version.label,
    about: isCurrent ? 'As it is now.' : 'Computed now: its geometry with what is set today.',
    missing: subject.part === null ? 'None of its parts has a value.' : `${subject.part} is not in ${version.label}.`,
  });
}

async function lockSide(db: Executor, subject: Subject, lock: FoundLock): Promise<ComparedSide> {
  const values = await lockedValue(db, lock.id);
  const where = lock.copy ? `${lock.shot}, copy ${lock.copy}` : lock.shot;
  return toSide(subject, values, { ref: 'lock', name: `locked in ${where}`, version: values[0].version, about: `Locked as approved with ${values[0].version}.`, missing: '' });
}

function toSide(subject: Subject, values: readonly PartValue[], words: { ref: string; name: string; version: string; about: string; missing: string }): ComparedSide {
  const [first] = values;
  const numbers = mergePartValues(values.flatMap((value) => value.numbers ?? []));
  const one = values.length === 1;
  return {
    ref: words.ref,
    version: words.version,
    mesh_scale: first ? first.scale / subject.scale : 1,
    name: words.name,
    about: numbers ? `${words.about}${subject.part === null ? countWords(values) : ''}` : one && subject.part !== null ? `${capital(first.why)}.` : words.missing,
    by: one ? first.by : null,
    at: one ? first.at : null,
    numbers,
    volume_m3: sumOf(values.map((value) => value.volumeM3)),
    area_m2: sumOf(values.map((value) => value.areaM2)),
  };
}

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** How many of the parts taken together count at all. */
function countWords(values: readonly PartValue[]): string {
  const counted = values.filter((value) => value.numbers !== null).length;
  return counted === values.length ? ` ${counted === 1 ? 'One part' : `${counted} parts`}.` : ` ${counted} of ${values.length} parts have a value.`;
}

function sumOf(values: readonly (number | null)[]): number | null {
  const given = values.filter((value) => value !== null);
  return given.length === 0 ? null : given.reduce((total, value) => total + value, 0);
}

async function partNames(db: Executor, assetId: string): Promise<string[]> {
  const { rows } = await db.execute<{ part: string }>(sql`select part from part_current where asset_id = ${assetId} order by part collate "C"`);
  return rows.map((row) => row.part);
}

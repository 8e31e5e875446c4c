import { and, eq, isNull } from 'drizzle-orm';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import type { EditShowInput } from '@/lib/rules/inputs/edit-show';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess, type Show } from './get-show-access';
import { lockShow } from './refuse-last-lead';
import { showAnswer } from './show-answer';

/** Columns of a change by their API names. */
const COLUMN = {
  title: 'title',
  linear_unit: 'linearUnit',
  up_axis: 'upAxis',
  scheme: 'scheme',
  boundary: 'boundary',
  parts_by: 'partsBy',
  other_space: 'otherSpace',
  name_pattern: 'namePattern',
  self_approval: 'selfApproval',
  tolerance_mass_percent: 'toleranceMassPercent',
  tolerance_com_percent: 'toleranceComPercent',
  tolerance_moments_percent: 'toleranceMomentsPercent',
} as const satisfies Partial<Record<keyof EditShowInput, keyof Show>>;
type Field = keyof typeof COLUMN;

const FROZEN_BY_IMPORT: readonly Field[] = ['linear_unit', 'up_axis', 'scheme'];

/**
 * Changes a show. Unit, up axis and scheme are refused as frozen from the first import on; an archived show takes nothing
 * but being brought back. What is as it was is not written down.
 */
export async function editShow(context: Context, input: EditShowInput): Promise<ReturnType<typeof showAnswer>> {
  const known = requireActor(context);
  return known.db.transaction(async (tx) => {
    const reopens = input.archived === false;
    const { show: seen, role } = await getShowAccess(tx, known.actor, input.show, reopens ? 'readShow' : 'editShow');
    if (reopens && role !== 'lead' && role !== 'admin') throw new StudioError('forbidden', `Your role in ${seen.code} does not allow this. Ask a lead.`);
    await lockShow(tx, seen.id);
    const [show] = await tx.select().from(shows).where(eq(shows.id, seen.id));
    const items = changes(show, input);
    if (items.length === 0) return showAnswer(show);
    const frozen = items.find((item) => (FROZEN_BY_IMPORT as readonly string[]).includes(item.field));
    if (show.frozenAt && frozen) {
      throw new StudioError('frozen', `${show.code} has imports: its unit, up axis and scheme stay as they are.`, { field: frozen.field });
    }
    const [changed] = await tx
      .update(shows)
      .set(columns(show, input))
      .where(and(eq(shows.id, show.id), reopens ? undefined : isNull(shows.archivedAt)))
      .returning();
    if (!changed) throw new StudioError('frozen', `${show.code} is archived and can only be read.`);
    await recordEvent(tx, known, { showId: show.id, act: 'edit-show', subject: show.code, items });
    return showAnswer(changed);
  });
}

/** The value that the field is to have; undefined where the input leaves it out. */
function wanted(input: EditShowInput, field: Field): string | number | boolean | null | undefined {
  return field === 'name_pattern' && input.name_pattern !== undefined ? input.name_pattern || null : input[field];
}

function changes(show: Show, input: EditShowInput): ChangedField[] {
  const text = (value: string | number | boolean | null) => (value === null ? null : String(value));
  const fields = (Object.keys(COLUMN) as Field[]).flatMap((field): ChangedField[] => {
    const after = wanted(input, field);
    const before = show[COLUMN[field]];
    return after === undefined || after === before ? [] : [{ field, before: text(before), after: text(after) }];
  });
  const isArchived = show.archivedAt !== null;
  if (input.archived !== undefined && input.archived !== isArchived) fields.push({ field: 'archived', before: text(isArchived), after: text(input.archived) });
  return fields;
}

function columns(show: Show, input: EditShowInput): Partial<typeof shows.$inferInsert> {
  const set = Object.fromEntries((Object.keys(COLUMN) as Field[]).map((field) => [COLUMN[field], wanted(input, field)]).filter(([, value]) => value !== undefined));
  if (input.archived !== undefined) set.archivedAt = input.archived ? (show.archivedAt ?? new Date()) : null;
  return set;
}

import { eq } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import type { NoticeText } from '@/db/schema/notices';
import type { Show } from '@/lib/shows/get-show-access';
import { findMoved, type Moved } from './find-moved';
import { findImportReaders } from './find-import-readers';
import { counted, cutList, shortList } from './list-words';
import { approvalsLink, outdatedShotsLink } from './notice-paths';
import { tellPeople } from './tell-people';

/**
 * Tells of an import whose last file has ended: what its new versions moved beyond the show's tolerance from what is approved or
 * locked, and the shots that are out of date by it. Told are those who asked to be told of the show, an asset or a shot concerned,
 * who took a lock concerned, and who locked it; each once, in one notice, however often this runs.
 * @param since only files that ended later count; of an import whose failed files were tried again. Null for all
 */
export async function tellOfImport(tx: Transaction, { importId, since }: { importId: string; since: string | null }): Promise<number> {
  const [found] = await tx
    .select({ show: shows, by: users })
    .from(imports)
    .innerJoin(shows, eq(shows.id, imports.showId))
    .innerJoin(users, eq(users.id, imports.createdBy))
    .where(eq(imports.id, importId));
  if (!found) return 0;
  const { show, by } = found;
  const moved = await findMoved(tx, show, importId, since);
  if (moved.length === 0) return 0;
  const readers = await findImportReaders(tx, show.id, moved);
  const tellings = readers.map(({ userId, why, concerns }) => ({ userIds: [userId], text: textOf(by.name, show, moved.filter(concerns), why) }));
  return tellPeople(tx, { showId: show.id, actorId: by.id, key: since === null ? `import:${importId}` : `import:${importId}:${since}`, tellings });
}

function textOf(by: string, show: Show, moved: readonly Moved[], why: string): NoticeText {
  const parts = new Set(moved.map((one) => one.partId)).size;
  const shots = [...new Set(moved.flatMap((one) => one.locks.map((lock) => lock.shot)))];
  const versions = [...new Set(moved.map((one) => `${one.asset} ${one.version}`))];
  const outdated = shots.length === 0 ? '' : `, ${counted(shots.length, 'shot')} out of date`;
  return {
    subject: `${shortList(versions)}: ${counted(parts, 'part')} changed${outdated} (${show.title})`,
    lines: [
      `${by} imported ${shortList(versions)} into ${show.title}.`,
      `${counted(parts, 'part')} differ${parts === 1 ? 's' : ''} from what is approved or locked by more than the show’s tolerance.${shots.length === 0 ? '' : ` Out of date: ${shortList(shots)}. Their locks stand until somebody re-locks them.`}`,
    ],
    list: cutList(moved.map(lineOf)),
    ...(shots.length === 0 ? approvalsLink(show.code) : outdatedShotsLink(show.code)),
    why,
  };
}

function lineOf(one: Moved): string {
  const shots = [...new Set(one.locks.map((lock) => lock.shot))];
  return `${one.asset}/${one.part}: ${one.verdict}, against ${one.against}${shots.length === 0 ? ' (approved)' : `, locked in ${shortList(shots)}`}`;
}

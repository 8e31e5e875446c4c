import { findActor } from '@/lib/auth/find-actor';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { eventStream, eventText } from './event-stream';
import { getImportRow } from './get-import-row';
import { onImportNotice } from './import-notices';
import { ImportTeller } from './import-teller';
import { noteWatching } from './note-watching';
import { parseMark } from './read-import-changes';

/**
 * An import as server-sent events: first the whole of it, then its state and counts with the files that changed, at most one event a
 * second. With an event's id as Last-Event-ID what changed since is sent, and nothing of it is missed. The stream ends with the import,
 * and with the reader's right to read it.
 */
export async function streamImport(context: Context, input: ImportRefInput, request: Request): Promise<Response> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { id } = await getImportRow(db, show.id, input.import);
  const teller = new ImportTeller(db, show.id, id, parseMark(request.headers.get('last-event-id')));
  const mayRead = async () => {
    const now = await findActor(db, request.headers);
    return now !== null && now.userId === actor.userId && (await getShowAccess(db, now, show.code, 'readShow').then(() => true, () => false));
  };
  let isFirst = true;
  return eventStream({
    userId: actor.userId,
    signal: request.signal,
    subscribe: (onNews) => onImportNotice(id, onNews),
    read: async () => {
      if (!isFirst && !(await mayRead())) return { events: [], isOver: true };
      if (isFirst) await noteWatching(db, actor, id);
      isFirst = false;
      const { news, isOver } = await teller.next();
      return { events: news === null ? [] : [eventText(news.mark, 'import', news)], isOver };
    },
    mayGoOn: async () => {
      const may = await mayRead();
      if (may) await noteWatching(db, actor, id);
      return may;
    },
  });
}

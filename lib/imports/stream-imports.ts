import { findActor } from '@/lib/auth/find-actor';
import { requireActor } from '@/lib/auth/require-actor';
import type { Actor, Context } from '@/lib/context';
import type { WatchImportsInput } from '@/lib/rules/inputs/watch-imports';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { eventStream, eventText } from './event-stream';
import { getImportRow } from './get-import-row';
import { onImportNotice } from './import-notices';
import { ImportTeller } from './import-teller';
import { noteWatching } from './note-watching';
import { parseMark } from './read-import-changes';

interface Watched {
  show: string;
  /** As the caller wrote it, which is how the events name it. */
  name: string;
  teller: ImportTeller;
  isDue: boolean;
}

/**
 * Several imports, of any shows, in one server-sent stream: what a browser opens once, however many of its tabs look at however many
 * imports. Events are `import`, `{show, …}` with the files that changed, at most one a second and import, and `gone`, `{show, id}`, for
 * one that is not, or no longer, the caller's to read. An event's id says for each of the imports how far it was told: with it as
 * Last-Event-ID nothing is missed. The stream ends when all have ended.
 * Errors: not_found where none of them is the caller's to read.
 */
export async function streamImports(context: Context, input: WatchImportsInput, request: Request): Promise<Response> {
  const { db, actor } = requireActor(context);
  const resumed = (request.headers.get('last-event-id') ?? '').split(',');
  const places = await Promise.all(
    input.watch.map(async (asked, index): Promise<Watched | null> => {
      try {
        const { show } = await getShowAccess(db, actor, asked.show, 'readShow');
        const { id } = await getImportRow(db, show.id, asked.import);
        const since = parseMark(resumed[index]) ?? parseMark(asked.since);
        return { show: asked.show, name: asked.import, teller: new ImportTeller(db, show.id, id, since), isDue: true };
      } catch (error) {
        if (error instanceof StudioError) return null;
        throw error;
      }
    }),
  );
  if (places.every((place) => place === null)) throw new StudioError('not_found', 'There is no such import.');
  const marks = places.map((place) => place?.teller.mark ?? 0n);
  const eventId = () => marks.join(',');
  const gone = (index: number) => {
    places[index] = null;
    return eventText(eventId(), 'gone', { show: input.watch[index].show, id: input.watch[index].import });
  };
  const goneAtFirst = places.flatMap((place, index) => (place === null ? [index] : []));
  return eventStream({
    userId: actor.userId,
    signal: request.signal,
    subscribe: (onNews) => {
      const stops = places.flatMap((place) =>
        place === null
          ? []
          : [
              onImportNotice(place.teller.importId, () => {
                place.isDue = true;
                onNews();
              }),
            ],
      );
      return () => stops.forEach((stop) => stop());
    },
    read: async () => {
      const now = await sameActor(context, actor, request);
      if (now === null) return { events: [], isOver: true };
      const events = goneAtFirst.splice(0).map(gone);
      for (const [index, place] of places.entries()) {
        if (!place?.isDue) continue;
        place.isDue = false;
        if (!(await mayRead(context, now, place.show))) {
          events.push(gone(index));
          continue;
        }
        await noteWatching(db, now, place.teller.importId);
        const { news, isOver } = await place.teller.next();
        marks[index] = place.teller.mark;
        if (news !== null) events.push(eventText(eventId(), 'import', { show: place.show, ...news, id: place.name }));
        if (isOver) places[index] = null;
      }
      return { events, isOver: places.every((place) => place === null) };
    },
    mayGoOn: async () => {
      const now = await sameActor(context, actor, request);
      if (now === null) return false;
      for (const place of places) {
        if (place === null) continue;
        if (await mayRead(context, now, place.show)) await noteWatching(db, now, place.teller.importId);
        // Told as gone with the next reading, which a closed stream brings at once.
        else return false;
      }
      return true;
    },
  });
}

async function sameActor({ db }: Context, actor: Actor, request: Request): Promise<Actor | null> {
  const now = await findActor(db, request.headers);
  return now?.userId === actor.userId ? now : null;
}

const mayRead = ({ db }: Context, actor: Actor, show: string): Promise<boolean> => getShowAccess(db, actor, show, 'readShow').then(() => true, () => false);

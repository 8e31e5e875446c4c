import type { Database } from '@/db/client';
import type { ImportDetail, ImportFileAnswer } from '@/lib/rules/import-answer';
import { readImportChanges, type ChangeMark } from './read-import-changes';

/** What one reader was told of one import already, so that they are told only what is new to them. */
export class ImportTeller {
  private readonly told = new Map<string, string>();
  private toldState = '';

  constructor(
    private readonly db: Database,
    private readonly showId: string,
    readonly importId: string,
    private since: ChangeMark | null,
  ) {}

  /** How far this reader has been told. */
  get mark(): ChangeMark {
    return this.since ?? 0n;
  }

  /** What is new, with the files that changed alone; null when nothing is. `isOver` once the import has ended. */
  async next(): Promise<{ news: ImportDetail | null; isOver: boolean }> {
    const { detail, mark } = await readImportChanges(this.db, this.showId, this.importId, this.since);
    this.since = mark;
    const files = detail.files.filter((file) => this.isNew(file));
    const state = stateMark(detail);
    const isSame = files.length === 0 && state === this.toldState;
    this.toldState = state;
    return { news: isSame ? null : { ...detail, files }, isOver: detail.state === 'done' || detail.state === 'cancelled' };
  }

  private isNew(file: ImportFileAnswer): boolean {
    const mark = JSON.stringify(file);
    if (this.told.get(file.name) === mark) return false;
    this.told.set(file.name, mark);
    return true;
  }
}

/** What is told of an import beside its files; not the time left, which moves by itself. */
function stateMark({ state, paused, counts, submitted_at, ended_at }: ImportDetail): string {
  return JSON.stringify([state, paused, counts, submitted_at, ended_at]);
}

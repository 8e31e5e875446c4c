import type { Origin } from './states';

/** One field that an act changed, before and after, as text; null means not given. */
export interface HistoryItem {
  /** `asset/part`; null for what is not about a part. */
  part: string | null;
  /** Code of the shot; null for what is not about one. */
  shot: string | null;
  field: string;
  before: string | null;
  after: string | null;
  /** What `before` and `after` stand for where they are ids, such as `585.1 kg (v012)`; null where they speak for themselves. */
  before_words: string | null;
  after_words: string | null;
}

/** One act in a show's history, as pages and lists have it. */
export interface HistoryEvent {
  id: number;
  act: string;
  subject: string;
  reason: string | null;
  origin: Origin;
  person: { name: string; email: string } | null;
  at: string;
  /** How many of the fields that changed are asked for; `items` has the first of them. */
  item_count: number;
  items: HistoryItem[];
}

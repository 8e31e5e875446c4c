/** The first rows of an export as the file will have them. */
export interface ExportPreview {
  columns: string[];
  rows: string[][];
  /** Rows of the whole file, and how many of them have no mass. */
  total: number;
  without_mass: number;
}

/** A hand-off as the list of receipts tells it. */
export interface ReceiptRow {
  id: string;
  taken_at: string;
  taken_by: string;
  /** Name of the token; null for a download in the browser. */
  token: string | null;
  format: string;
  selection: string;
  rows: number;
  bytes: number;
  sha256: string;
}

export interface ReceiptPage {
  items: ReceiptRow[];
  next_cursor: string | null;
}

/** What the values are not for: on the export, on the receipt and in the README. */
export const CAUTION =
  'Values describe digital assets. They are not for the rating, rigging or handling of physical props, animatronics, stunt or flying equipment; for those defer to local codes and to a licensed engineer.';

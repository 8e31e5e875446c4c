/** Finds a file that lies beside the one that is read, by its path from there; null where there is none. Nothing is ever fetched from elsewhere. */
export type Beside = (path: string) => Promise<Uint8Array | null>;

/** For files that come alone. */
export const NOTHING_BESIDE: Beside = () => Promise.resolve(null);

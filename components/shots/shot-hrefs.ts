const show = (code: string) => `/shows/${encodeURIComponent(code)}`;

export const shotsHref = (code: string): string => `${show(code)}/shots`;
export const shotHref = (code: string, shot: string): string => `${show(code)}/shots/${encodeURIComponent(shot)}`;
export const sequenceHref = (code: string, sequence: string): string => `${show(code)}/sequences/${encodeURIComponent(sequence)}`;
export const compareLockHref = (code: string, lock: string): string => `${show(code)}/compare?lock=${encodeURIComponent(lock)}`;
export const partPageHref = (code: string, asset: string, part: string): string => `${show(code)}/assets/${encodeURIComponent(asset)}/${encodeURIComponent(part)}`;

/** The file of what is locked for a shot; text cells guarded, since a person opens it in a spreadsheet. */
export const shotCsvHref = (code: string, shot: string): string => `/api/v1${shotHref(code, shot)}/export.csv?guard=1`;
export const shotJsonHref = (code: string, shot: string): string => `/api/v1${shotHref(code, shot)}/export.json`;

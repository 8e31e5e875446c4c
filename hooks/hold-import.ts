/**
 * Holds an import for this tab, so that no other tab of the browser goes on with it meanwhile. Answers how it is let go, which leaving the
 * page does too, or null where another tab holds it. Browsers give out such holds over HTTPS alone; elsewhere there is nobody to ask.
 */
export function holdImport(id: string): Promise<(() => void) | null> {
  if (!('locks' in navigator)) return Promise.resolve(() => undefined);
  return new Promise((resolve, reject) => {
    const held = navigator.locks.request(`weighhouse-import-${id}`, { ifAvailable: true }, (lock) => {
      if (lock === null) return resolve(null);
      return new Promise<void>((letGo) => resolve(letGo));
    });
    held.catch(reject);
  });
}

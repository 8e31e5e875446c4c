const STEPS = ['B', 'kB', 'MB', 'GB', 'TB', 'PB'] as const;

/** A size to read, in powers of 1000 and three significant digits. */
export function formatBytes(bytes: number): string {
  let value = bytes;
  let step = 0;
  while (value >= 999.5 && step < STEPS.length - 1) {
    value /= 1000;
    step += 1;
  }
  return `${step === 0 ? value : Number(value.toPrecision(3))} ${STEPS[step]}`;
}

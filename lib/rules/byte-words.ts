const STEPS = ['bytes', 'kB', 'MB', 'GB', 'TB'];

/** A number of bytes as people read it, by thousands: 1.2 MB. */
export function byteWords(bytes: number): string {
  let value = bytes;
  let step = 0;
  while (value >= 999.5 && step < STEPS.length - 1) {
    value /= 1000;
    step++;
  }
  const digits = step === 0 || value >= 99.95 ? 0 : 1;
  return `${value.toFixed(digits)} ${STEPS[step]}`;
}

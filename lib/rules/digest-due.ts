/** The last moment at or before `now` when digests were due: every day at this hour of UTC. */
export function digestDue(now: Date, hour: number): Date {
  const today = Date.UTC(now.getUTCFullYear(), now.getUTCMonth(), now.getUTCDate(), hour);
  return new Date(today <= now.getTime() ? today : today - 24 * 3600 * 1000);
}

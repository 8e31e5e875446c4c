/** What an import brought to an end lately, and what is left of it. Work is counted in bytes, each file with a share of its own. */
interface ImportPace {
  /** Seconds in which `work` was done, up to now. */
  seconds: number;
  files: number;
  work: number;
  left: number;
}

/** What a file costs whatever its size, in bytes of one that is large. */
export const WORK_OF_A_FILE = 65_536;
/** Ends from which, and seconds in which, a pace can be told. */
const FEWEST_FILES = 5;
const SHORTEST_SECONDS = 5;

/** Seconds until the import ends at its present pace; null while that cannot be told. */
export function secondsLeft({ seconds, files, work, left }: ImportPace): number | null {
  if (left <= 0) return 0;
  if (files < FEWEST_FILES || seconds < SHORTEST_SECONDS || work <= 0) return null;
  return Math.ceil((left * seconds) / work);
}

/** `less than a minute left`, `about 4 min left`, `about 1 h 20 min left`. No finer than such a guess can be. */
export function timeLeftWords(seconds: number): string {
  if (seconds < 55) return 'less than a minute left';
  const minutes = Math.round(seconds / 60);
  if (minutes < 20) return `about ${minutes} min left`;
  const rounded = Math.round(minutes / 5) * 5;
  if (rounded < 60) return `about ${rounded} min left`;
  const [hours, rest] = [Math.floor(rounded / 60), rounded % 60];
  return rest === 0 ? `about ${hours} h left` : `about ${hours} h ${rest} min left`;
}

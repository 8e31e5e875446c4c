import { PLACES_KEPT, type Finding, type Place, type Severity } from '../measured';

/** A place with the given fields; the rest is null. */
export function placeOf(fields: Partial<Place>): Place {
  return { face: null, edge: null, vertex: null, position: null, line: null, ...fields };
}

/** Gathers findings: one per code and part, with a count and the first places. */
export class FindingList {
  private readonly found = new Map<string, Finding>();

  /** `message` gives the sentence for the final count. */
  add(code: string, severity: Severity, part: string | null, place: Place | null, message: (count: number) => string): void {
    const key = `${code}\n${part ?? ''}\n${severity}`;
    let finding = this.found.get(key);
    if (finding === undefined) {
      finding = { code, severity, part, message: '', count: 0, places: [] };
      this.found.set(key, finding);
    }
    finding.count++;
    finding.message = message(finding.count);
    if (place !== null && finding.places.length < PLACES_KEPT) finding.places.push(place);
  }

  /** Problems first, then warnings, then notes; in the order found within each. */
  list(): Finding[] {
    const order: Record<Severity, number> = { problem: 0, warning: 1, note: 2 };
    return [...this.found.values()].sort((a, b) => order[a.severity] - order[b.severity]);
  }
}

/** "1 edge", "3 edges". */
export function counted(count: number, singular: string, plural: string): string {
  return `${count} ${count === 1 ? singular : plural}`;
}

import type { FaceLabels } from '../engine/cage';
import { growingInt32, growingUint32 } from './growing-array';

const NO_LABEL = -1;

/**
 * Collects one labelling of a cage's faces: the name set last holds for every face after it. Names without faces leave no trace.
 * Kept are runs of faces, so that a face costs nothing until the labelling is taken.
 */
export class FaceLabeller {
  private readonly names: string[] = [];
  private readonly indexOf = new Map<string, number>();
  private readonly runStarts = growingUint32();
  private readonly runLabels = growingInt32();
  private current: string | null = null;
  private from = 0;

  /** Names that have faces. */
  get count(): number {
    return this.names.length;
  }

  /** Name of the faces from `face` on, the number of faces so far; null for none. */
  set(name: string | null, face: number): void {
    this.endRun(face);
    this.current = name;
    this.from = face;
  }

  private endRun(face: number): void {
    if (face === this.from) return;
    this.runStarts.push(this.from);
    this.runLabels.push(this.current === null ? NO_LABEL : this.labelOf(this.current));
  }

  private labelOf(name: string): number {
    const known = this.indexOf.get(name);
    if (known !== undefined) return known;
    this.indexOf.set(name, this.names.length);
    return this.names.push(name) - 1;
  }

  /** The labelling of all `faces`, or null where none has a name. To be asked once. */
  take(faces: number): FaceLabels | null {
    this.endRun(faces);
    if (this.names.length === 0) return null;
    const starts = this.runStarts.take();
    const runLabels = this.runLabels.take();
    const labels = new Int32Array(faces);
    for (let run = 0; run < starts.length; run++) labels.fill(runLabels[run], starts[run], starts[run + 1] ?? faces);
    return { names: this.names, labels };
  }
}

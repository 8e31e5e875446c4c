import type { FaceLabels } from '../engine/cage';
import { growingInt32 } from './growing-array';

/** Collects one labelling of a cage's faces: the name set last holds for every face after it. Names without faces leave no trace. */
export class FaceLabeller {
  private readonly names: string[] = [];
  private readonly indexOf = new Map<string, number>();
  private readonly labels = growingInt32();
  private current: string | null = null;
  private currentIndex = -1;

  get count(): number {
    return this.names.length;
  }

  /** Name of the faces to come; null for none. */
  set(name: string | null): void {
    this.current = name;
    this.currentIndex = name === null ? -1 : (this.indexOf.get(name) ?? -1);
  }

  labelFace(): void {
    if (this.current !== null && this.currentIndex < 0) {
      this.currentIndex = this.names.length;
      this.names.push(this.current);
      this.indexOf.set(this.current, this.currentIndex);
    }
    this.labels.push(this.currentIndex);
  }

  /** The labelling, or null where no face has a name. */
  take(): FaceLabels | null {
    return this.names.length === 0 ? null : { names: this.names, labels: this.labels.take() };
  }
}

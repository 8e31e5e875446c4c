import { growingFloat64, growingUint32 } from './growing-array';

/** Vertices and faces of an OBJ file as they come in. Indices count from 0; lines, of the faces, from 1. */
export class ObjPolygons {
  readonly positions = growingFloat64();
  readonly faceStarts = growingUint32();
  readonly faceVertices = growingUint32();
  readonly faceLines = growingUint32();
  vertices = 0;
  faces = 0;

  constructor() {
    this.faceStarts.push(0);
  }

  /** Ends a face whose vertices are in place. */
  endFace(line: number): void {
    this.faceStarts.push(this.faceVertices.length);
    this.faceLines.push(line);
    this.faces++;
  }
}

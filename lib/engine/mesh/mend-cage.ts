import type { Cage } from '../cage';
import type { MeasureOptions } from '../measured';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import { orientFaces } from './orient-faces';
import { weldVertices } from './weld-vertices';

/**
 * The cage as it is measured under the options: with borders welded and faces turned one way where these are asked for, and as it is otherwise.
 * What was changed is noted in `findings`; `joined` are the vertices that a weld took out of their faces. Faces of the answer are numbered as in the file unless the weld dropped some.
 */
export function mendCage(cage: Cage, options: MeasureOptions, findings: FindingList): { cage: Cage; joined: Int32Array } {
  let mended = cage;
  let joined: Int32Array = new Int32Array(0);
  if (options.weld === true) {
    const weld = weldVertices(mended);
    joined = weld.joined;
    for (const vertex of joined) {
      findings.add('welded', 'note', null, placeOf({ vertex, position: positionOf(cage, vertex) }),
        (n) => `${counted(n, 'vertex on an open border was', 'vertices on open borders were')} joined with another, as the import asks; weld ${n === 1 ? 'it' : 'them'} in the file, too.`);
    }
    mended = weld.cage;
  }
  if (options.turnFaces === true) {
    const { cage: oriented, turned } = orientFaces(mended);
    for (const face of turned) {
      findings.add('faces_turned', 'note', null, placeOf({ face, position: positionOf(mended, mended.faceVertices[mended.faceStarts[face]]), line: mended.faceLines?.[face] ?? null }),
        (n) => `${counted(n, 'face was', 'faces were')} turned round so that all look outwards, as the import asks; turn ${n === 1 ? 'it' : 'them'} in the file, too.`);
    }
    mended = oriented;
  }
  return { cage: mended, joined };
}

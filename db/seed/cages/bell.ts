import { CageDraft } from './cage-draft';
import { layBar } from './blocks';
import { ballRadius, layBall, layRope, turnSolid } from './solids';
import type { Vec } from './vector';

const UP: Vec = [0, 1, 0];

/** A bell of one metre, mouth down, with crown loops and a headstock. The crown was cast around a core: a cavity. */
export function bell(): CageDraft {
  const draft = new CageDraft();
  turnSolid(
    draft,
    'bell',
    [
      // Down the inner side from the vault, around the lip, up the outer side.
      { radius: 10, along: 82 }, { radius: 21, along: 78 }, { radius: 24, along: 66 }, { radius: 28.5, along: 40 }, { radius: 36, along: 18 }, { radius: 42, along: 6 }, { radius: 46, along: 0.4, sharp: true },
      { radius: 49.5, along: 0, sharp: true }, { radius: 50, along: 4 }, { radius: 43, along: 16 }, { radius: 33.5, along: 38 }, { radius: 28.5, along: 64 }, { radius: 26.5, along: 78 },
      { radius: 22, along: 88 }, { radius: 13, along: 92 }, { radius: 12, along: 104, sharp: true },
    ],
    { origin: [0, 0, 0], axis: UP, sides: 24 },
  );
  const core = 4.6 * ballRadius(2);
  const first = draft.faces.length;
  layBall(draft, 'bell', 2, ([x, y, z]): Vec => [x * core, 94.6 + y * core, z * core]);
  for (const face of draft.faces.slice(first)) face.corners.reverse();
  for (let i = 0; i < 4; i++) {
    const angle = (Math.PI / 2) * i;
    const at = (r: number, y: number): Vec => [r * Math.cos(angle), y, r * Math.sin(angle)];
    layRope(draft, 'crown', [at(6.2, 105.4), at(8, 108), at(11, 111.4), at(9.6, 115.4), at(4.8, 117.4)], { radius: [1.9, 1.8, 1.8, 1.8, 2], sides: 8, hint: [Math.sin(angle), 0, -Math.cos(angle)] });
  }
  layBar(draft, 'headstock', [-62, 127, 0], [62, 127, 0], UP, [14.4, 16]);
  return draft;
}

/** The clapper, hung from its staple. */
export function clapper(): CageDraft {
  const draft = new CageDraft();
  turnSolid(
    draft,
    'clapper',
    [
      { radius: 1.5, along: -14 }, { radius: 2.6, along: -12 }, { radius: 3, along: -6 }, { radius: 6.5, along: -2 }, { radius: 9, along: 5 }, { radius: 8.4, along: 11 }, { radius: 4.4, along: 17 },
      { radius: 2.6, along: 26 }, { radius: 2.2, along: 50 }, { radius: 2.4, along: 68 }, { radius: 3.4, along: 74 }, { radius: 3.2, along: 79 },
    ],
    { origin: [0, 0, 0], axis: UP, sides: 12 },
  );
  return draft;
}

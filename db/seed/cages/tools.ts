import { layBar, layPlank } from './blocks';
import { CageDraft } from './cage-draft';
import { layHoop } from './plates';
import { layRope, turnSolid, type TurnStation } from './solids';
import type { Vec } from './vector';

const UP: Vec = [0, 1, 0];
const FORWARD: Vec = [0, 0, 1];

/** A lantern of iron and glass, 34 cm with its ring. */
export function lantern(): CageDraft {
  const draft = new CageDraft();
  const stand = (profile: TurnStation[], part: string, closed = false) => turnSolid(draft, part, profile, { origin: [0, 0, 0], axis: UP, sides: 12, closed });
  stand([{ radius: 8.6, along: 0, sharp: true }, { radius: 8.8, along: 1.2, sharp: true }, { radius: 7.6, along: 2.2 }, { radius: 7.2, along: 3.2, sharp: true }], 'base');
  stand(
    [{ radius: 5.4, along: 3.3, sharp: true }, { radius: 6.4, along: 8 }, { radius: 6.2, along: 14 }, { radius: 5, along: 19.4, sharp: true }, { radius: 4.7, along: 19.4, sharp: true }, { radius: 5.9, along: 14 }, { radius: 6.1, along: 8 }, { radius: 5.1, along: 3.3, sharp: true }],
    'glass',
    true,
  );
  stand([{ radius: 8.2, along: 20, sharp: true }, { radius: 8.3, along: 20.8, sharp: true }, { radius: 5.6, along: 24 }, { radius: 2.4, along: 26 }, { radius: 2.2, along: 28.4 }, { radius: 1.2, along: 29.4, sharp: true }], 'roof');
  for (let i = 0; i < 4; i++) {
    const angle = (Math.PI / 2) * (i + 0.5);
    const at = (y: number, r: number): Vec => [r * Math.cos(angle), y, r * Math.sin(angle)];
    layRope(draft, 'pillars', [at(3.1, 7), at(8, 7.3), at(15, 7.3), at(20.1, 7)], { radius: 0.45, sides: 6, hint: [Math.sin(angle), 0, -Math.cos(angle)] });
  }
  const ring = Array.from({ length: 12 }, (_, i): Vec => [3.6 * Math.cos((i * Math.PI) / 6), 33.8 + 3.6 * Math.sin((i * Math.PI) / 6), 0]);
  layRope(draft, 'ring', ring, { radius: 0.4, sides: 6, hint: FORWARD, closed: true });
  return draft;
}

/** A bucket with its bail and the water it can hold. */
export function bucket(): CageDraft {
  const draft = new CageDraft();
  const stand = (profile: TurnStation[], part: string) => turnSolid(draft, part, profile, { origin: [0, 0, 0], axis: UP, sides: 16 });
  stand(
    [
      { radius: 12.6, along: 0, sharp: true }, { radius: 13, along: 3 }, { radius: 14.6, along: 16 }, { radius: 15.6, along: 27 }, { radius: 15.9, along: 30, sharp: true },
      { radius: 14.5, along: 30, sharp: true }, { radius: 14.2, along: 27 }, { radius: 13.2, along: 16 }, { radius: 11.8, along: 4 }, { radius: 11.6, along: 2.4, sharp: true },
    ],
    'staves',
  );
  const bail: Vec[] = [[-16.8, 27, 0], [-16.9, 33, 0], [-14, 42, 0], [-7.5, 48, 0], [0, 49.6, 0], [7.5, 48, 0], [14, 42, 0], [16.9, 33, 0], [16.8, 27, 0]];
  layRope(draft, 'bail', bail, { radius: 0.7, sides: 8, hint: FORWARD });
  stand([{ radius: 11.4, along: 2.6, sharp: true }, { radius: 11.7, along: 4.2 }, { radius: 13, along: 16 }, { radius: 13.8, along: 25, sharp: true }], 'water');
  return draft;
}

/** An oar of 3.2 m. */
export function oar(): CageDraft {
  const draft = new CageDraft();
  const path = [-160, -152, -140, -134, -60, 40, 84, 100, 118, 140, 154, 160];
  layRope(draft, 'oar', path.map((z): Vec => [0, 0, z]), {
    radius: [1.4, 2.1, 1.9, 2.7, 3.1, 2.7, 2.3, 4, 7.4, 8.6, 8.2, 6.4],
    flat: [1, 1, 1, 1, 1, 1, 1, 0.5, 0.22, 0.15, 0.12, 0.11],
    sides: 8,
    hint: [1, 0, 0],
  });
  return draft;
}

/** A butter churn and its dasher. */
export function churn(): CageDraft {
  const draft = new CageDraft();
  const stand = (profile: TurnStation[], part: string, sides = 16) => turnSolid(draft, part, profile, { origin: [0, 0, 0], axis: UP, sides });
  stand(
    [
      { radius: 17, along: 0, sharp: true }, { radius: 17, along: 3 }, { radius: 14.6, along: 30 }, { radius: 12, along: 58 }, { radius: 11.4, along: 62, sharp: true },
      { radius: 10, along: 62, sharp: true }, { radius: 10.4, along: 58 }, { radius: 13, along: 30 }, { radius: 15, along: 5 }, { radius: 15, along: 3, sharp: true },
    ],
    'churn',
  );
  stand([{ radius: 7.5, along: 14, sharp: true }, { radius: 7.5, along: 16.5, sharp: true }, { radius: 1.8, along: 17.5 }, { radius: 1.5, along: 22 }, { radius: 1.4, along: 70 }, { radius: 1.5, along: 92 }, { radius: 2, along: 96 }, { radius: 1.6, along: 98 }], 'dasher', 8);
  return draft;
}

/** A coil of rope, six turns. */
export function rope(): CageDraft {
  const draft = new CageDraft();
  const steps = 96;
  const path = Array.from({ length: steps + 1 }, (_, i): Vec => {
    const turn = (i / 16) * 2 * Math.PI;
    return [24 * Math.cos(turn), 1.7 + (3.5 * i) / 16, 24 * Math.sin(turn)];
  });
  layRope(draft, 'rope', path, { radius: 1.6, sides: 6, hint: UP });
  return draft;
}

/** A tavern sign: post with arm, and the board under it. */
export function sign(): CageDraft {
  const draft = new CageDraft();
  layBar(draft, 'post', [0, 0, 0], [0, 300, 0], [1, 0, 0], [14, 14]);
  layBar(draft, 'post', [7, 276, 0], [96, 276, 0], UP, [9, 9]);
  layPlank(draft, 'post', [[7.3, 236, 3], [7.3, 236, -3], [7.3, 246, -3], [7.3, 246, 3], [36, 271.2, 3], [36, 271.2, -3], [26, 271.2, -3], [26, 271.2, 3]]);
  const z = 2.2;
  layPlank(draft, 'board', [[34, 206, z], [90, 206, z], [90, 206, -z], [34, 206, -z], [31, 261, z], [93, 261, z], [93, 261, -z], [31, 261, -z]]);
  for (const x of [42, 82]) layHoop(draft, 'board', { centre: [x, 266.2, 0], axis: [1, 0, 0], hint: UP, radii: [4.6, 3.4], width: 1.6, thickness: 0.7 });
  return draft;
}

/** A hay sledge: a decked frame on two runners with turned-up noses. */
export function sledge(): CageDraft {
  const draft = new CageDraft();
  for (let i = 0; i < 5; i++) layBar(draft, 'deck', [-40 + 20 * i, 34, -88], [-40 + 20 * i, 34, 78], UP, [3.5, 17.5]);
  for (const z of [-70, -4, 62]) {
    layBar(draft, 'deck', [-46, 29, z], [46, 29, z], UP, [6.4, 8]);
    for (const x of [-40, 40]) layBar(draft, 'deck', [x, 11, z], [x, 25.8, z], [1, 0, 0], [8, 8]);
  }
  for (const x of [-40, 40]) {
    const path: Vec[] = [[x, 5.5, -104], [x, 5.5, -60], [x, 5.5, 0], [x, 5.5, 60], [x, 6.5, 88], [x, 13, 108], [x, 25, 121], [x, 38, 126]];
    layRope(draft, 'runners', path, { radius: 4.8, sides: 4, hint: [1, 0, 0], sharp: true });
  }
  return draft;
}

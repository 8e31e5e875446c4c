import { layBar, layBlock, layBox } from './blocks';
import { CageDraft } from './cage-draft';
import { layHoop } from './plates';
import { ballRadius, layBall, turnSolid } from './solids';
import type { Vec } from './vector';

const UP: Vec = [0, 1, 0];
const FORWARD: Vec = [0, 0, 1];
const ACROSS: Vec = [1, 0, 0];

/** A raft of seven logs under two beams, no two logs alike. */
export function raft(): CageDraft {
  const draft = new CageDraft();
  const logs = [15.5, 14.2, 16.4, 15, 14.6, 16, 14.8];
  let x = -logs.reduce((sum, radius) => sum + radius, 0) - 3;
  logs.forEach((radius, i) => {
    x += radius;
    const length = 210 + 9 * Math.sin(7 * i + 2);
    turnSolid(
      draft,
      `log_${i + 1}`,
      [{ radius: radius * 0.94, along: -length, sharp: true }, { radius: radius, along: -length * 0.9 }, { radius: radius * 0.98, along: -length * 0.2 }, { radius: radius * 0.93, along: length * 0.5 }, { radius: radius * 0.9, along: length * 0.92 }, { radius: radius * 0.86, along: length, sharp: true }],
      { origin: [x, 16.6, 10 * Math.sin(5 * i)], axis: FORWARD, sides: 12 },
    );
    x += radius + 1;
  });
  for (const [part, z] of [['beam_aft', -150], ['beam_fore', 150]] as const) layBar(draft, part, [-112, 39.6, z], [112, 39.6, z], UP, [12, 18]);
  return draft;
}

const WHEEL_RIM = 142;
const SPOKES = 8;
const PADDLES = 16;

/** An undershot mill wheel, three metres across, on its axle along x. */
export function millWheel(): CageDraft {
  const draft = new CageDraft();
  const hubHeight = 160;
  const at = (x: number, radius: number, turn: number): Vec => [x, hubHeight + radius * Math.cos(turn), radius * Math.sin(turn)];
  turnSolid(draft, 'axle', [{ radius: 7, along: -120, sharp: true }, { radius: 7, along: -100, sharp: true }, { radius: 13, along: -96, sharp: true }, { radius: 13, along: 96, sharp: true }, { radius: 7, along: 100, sharp: true }, { radius: 7, along: 120, sharp: true }], { origin: [0, hubHeight, 0], axis: ACROSS, sides: 12 });
  layHoop(draft, 'hub', { centre: [0, hubHeight, 0], axis: ACROSS, hint: UP, radii: [27, 27], width: 96, thickness: 13.4 });
  for (const side of [1, -1]) {
    const name = side > 0 ? 'L' : 'R';
    layHoop(draft, `rim_${name}`, { centre: [36 * side, hubHeight, 0], axis: ACROSS, hint: UP, radii: [WHEEL_RIM, WHEEL_RIM], width: 9, thickness: 16 });
    for (let i = 0; i < SPOKES; i++) {
      const turn = (2 * Math.PI * (i + 0.5)) / SPOKES;
      layBar(draft, `spokes_${name}`, at(36 * side, 27, turn), at(36 * side, WHEEL_RIM - 17, turn), ACROSS, [7, 10]);
    }
  }
  for (let i = 0; i < PADDLES; i++) {
    const turn = (2 * Math.PI * (i + 0.25)) / PADDLES;
    const quarter = 1 + Math.floor((4 * i) / PADDLES);
    layBar(draft, `paddles_${quarter}`, at(-31, 138, turn), at(31, 138, turn), [0, Math.cos(turn), Math.sin(turn)], [34, 3.2]);
  }
  return draft;
}

/** A stone gate arch: two piers and five wedge stones. */
export function arch(): CageDraft {
  const draft = new CageDraft();
  const [inside, outside, depth, spring] = [85, 130, 55, 170];
  for (const side of [-1, 1]) layBox(draft, side > 0 ? 'pier_L' : 'pier_R', [side * 107.5, spring / 2, 0], [47, spring - 0.6, depth + 4], 0.07);
  const names = ['springer_L', 'voussoir_L', 'keystone', 'voussoir_R', 'springer_R'];
  names.forEach((name, i) => {
    const from = (Math.PI * i) / 5 + 0.004;
    const to = (Math.PI * (i + 1)) / 5 - 0.004;
    const proud = name === 'keystone' ? 9 : 0;
    const at = (angle: number, radius: number, z: number): Vec => [radius * Math.cos(angle), spring + radius * Math.sin(angle), z];
    const z = depth / 2 + proud / 3;
    layBlock(draft, name, [at(from, inside - proud / 2, z), at(from, outside + proud, z), at(from, outside + proud, -z), at(from, inside - proud / 2, -z), at(to, inside - proud / 2, z), at(to, outside + proud, z), at(to, outside + proud, -z), at(to, inside - proud / 2, -z)], 0.08);
  });
  return draft;
}

/** A timber bridge of three spans on stone piers, nine metres long, along z, with so many posts on each side. */
export function bridge(posts: number): CageDraft {
  const draft = new CageDraft();
  for (const [part, side] of [['abutment_near', -1], ['abutment_far', 1]] as const) layBox(draft, part, [0, 60, side * 405], [260, 120, 90], 0.06);
  for (const [part, side] of [['pier_1', -1], ['pier_2', 1]] as const) {
    const z = side * 150;
    const [w, d] = [110, 34];
    layBlock(draft, part, [[-w - 14, 0, z + d + 6], [w + 14, 0, z + d + 6], [w + 14, 0, z - d - 6], [-w - 14, 0, z - d - 6], [-w, 120, z + d], [w, 120, z + d], [w, 120, z - d], [-w, 120, z - d]], 0.07);
  }
  for (let span = 0; span < 3; span++) {
    const z = (span - 1) * 300;
    for (let plank = 0; plank < 9; plank++) layBar(draft, `deck_${span + 1}`, [-112, 136, z - 132 + 33 * plank], [112, 136, z - 132 + 33 * plank], UP, [8, 32]);
    for (const x of [-80, 0, 80]) layBar(draft, `deck_${span + 1}`, [x, 126.2, z - 149], [x, 126.2, z + 149], UP, [11.4, 16]);
  }
  for (const side of [1, -1]) {
    const name = side > 0 ? 'L' : 'R';
    for (let post = 0; post < posts; post++) {
      const z = -432 + (864 * post) / (posts - 1);
      layBar(draft, `posts_${name}`, [side * 104, 140.4, z], [side * 104, 226, z], FORWARD, [12, 10]);
    }
    layBar(draft, `rail_${name}`, [side * 104, 230.4, -446], [side * 104, 230.4, 446], UP, [8, 14]);
  }
  layBar(draft, 'gateBar', [-96, 190, -432], [96, 190, -432], UP, [9, 9]);
  return draft;
}

/** Five boulders; the third and the fifth are the first one again, turned and moved, the fourth is the second. */
export function boulders(): CageDraft {
  const draft = new CageDraft();
  const size = ballRadius(3);
  const stone = (seed: number, radii: Vec) => ([x, y, z]: Vec): Vec => {
    const bump = 1 + 0.13 * Math.sin(3.1 * x + seed) * Math.cos(2.7 * y - seed) + 0.1 * Math.sin(4.3 * z + 2.1 * seed + x) + 0.06 * Math.cos(6.1 * y + 3.3 * x * z + seed);
    return [round(x * radii[0] * size * bump), round(y * radii[1] * size * bump), round(z * radii[2] * size * bump)];
  };
  const first = stone(1.3, [52, 38, 46]);
  const second = stone(4.9, [34, 29, 40]);
  layBall(draft, 'boulder_1', 3, (d) => moved(first(d), [0, 36, 0]));
  layBall(draft, 'boulder_2', 3, (d) => moved(second(d), [104, 28, 30]));
  layBall(draft, 'boulder_3', 3, (d) => moved(quarterTurn(first(d)), [-118, 36, 34]));
  layBall(draft, 'boulder_4', 3, (d) => moved(quarterTurn(second(d)), [34, 28, -116]));
  layBall(draft, 'boulder_5', 3, (d) => moved(quarterTurn(quarterTurn(first(d))), [-66, 36, -128]));
  return draft;
}

/** To a micrometre, so that a turned copy is a copy to the last digit. */
const round = (value: number): number => Math.round(value * 1e4) / 1e4;
const moved = ([x, y, z]: Vec, by: Vec): Vec => [x + by[0], y + by[1], z + by[2]];
const quarterTurn = ([x, y, z]: Vec): Vec => [z, y, -x];

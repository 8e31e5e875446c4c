import { barding } from './barding';
import { bell, clapper } from './bell';
import type { CageDraft } from './cage-draft';
import { cloak, coat } from './clothes';
import { eel } from './eel';
import { harness } from './harness';
import { heron } from './heron';
import { ox, type OxBuild } from './ox';
import { person } from './person';
import { rat } from './rat';
import { toad } from './toad';
import { bucket, churn, lantern, oar, rope, sign, sledge } from './tools';
import { arch, boulders, bridge, millWheel, raft } from './works';

export type DemoCategory = 'creature' | 'prop' | 'costume' | 'set' | 'vehicle' | 'other';

export interface DemoFile {
  /** category/asset/asset_vNNN.obj */
  path: string;
  category: DemoCategory;
  text: string;
}

interface DemoVersion {
  asset: string;
  category: DemoCategory;
  version: number;
  draft: () => CageDraft;
  /** What goes wrong in the text on its way to the file. */
  damage?: (text: string) => string;
}

const GROWN: OxBuild = { hump: 0, horns: 1, legs: 1, size: 1 };
const FERRYWOMAN = { height: 166, hips: 1.06, waist: 0.98, chest: 0.98, shoulders: 0.94, limbs: 0.98, chin: 0.6, bun: true };
const RINGER = { height: 174, hips: 1.08, waist: 1.28, chest: 1.12, shoulders: 1.12, limbs: 1.14, chin: 3.4, bun: false };

function reversedShin(): CageDraft {
  const draft = rat();
  draft.reversePart('shin_R');
  return draft;
}

/** One plank's face names a vertex that the file does not have, as after a hand edit. */
function nameMissingVertex(text: string): string {
  const vertices = text.split('\n').filter((line) => line.startsWith('v ')).length;
  return text.replace(/(g deck_2\nf \d+ \d+ \d+) \d+/, `$1 ${vertices + 7}`);
}

const VERSIONS: readonly DemoVersion[] = [
  { asset: 'tarnOx', category: 'creature', version: 11, draft: () => ox({ ...GROWN, horns: 0.82 }) },
  { asset: 'tarnOx', category: 'creature', version: 12, draft: () => ox(GROWN) },
  { asset: 'tarnOx', category: 'creature', version: 13, draft: () => ox({ ...GROWN, hump: 20.5 }) },
  { asset: 'oxCalf', category: 'creature', version: 4, draft: () => ox({ hump: 0, horns: 0.22, legs: 1.22, size: 0.58 }) },
  { asset: 'bellToad', category: 'creature', version: 6, draft: () => toad(0.9) },
  { asset: 'bellToad', category: 'creature', version: 7, draft: () => toad(1.04) },
  { asset: 'heronHag', category: 'creature', version: 3, draft: heron },
  { asset: 'millRat', category: 'creature', version: 1, draft: rat },
  { asset: 'millRat', category: 'creature', version: 2, draft: reversedShin },
  { asset: 'eelKing', category: 'creature', version: 2, draft: eel },
  { asset: 'ferrywoman', category: 'creature', version: 8, draft: () => person(FERRYWOMAN) },
  { asset: 'ringer', category: 'creature', version: 5, draft: () => person(RINGER) },
  { asset: 'ferryCloak', category: 'costume', version: 3, draft: cloak },
  { asset: 'ringerCoat', category: 'costume', version: 2, draft: coat },
  { asset: 'oxHarness', category: 'costume', version: 4, draft: harness },
  { asset: 'oxBarding', category: 'costume', version: 2, draft: barding },
  { asset: 'sledge', category: 'vehicle', version: 2, draft: sledge },
  { asset: 'raft', category: 'vehicle', version: 3, draft: raft },
  { asset: 'bell', category: 'prop', version: 3, draft: bell },
  { asset: 'clapper', category: 'prop', version: 2, draft: clapper },
  { asset: 'lantern', category: 'prop', version: 2, draft: lantern },
  { asset: 'bucket', category: 'prop', version: 1, draft: bucket },
  { asset: 'oar', category: 'prop', version: 1, draft: oar },
  { asset: 'churn', category: 'prop', version: 2, draft: churn },
  { asset: 'rope', category: 'prop', version: 1, draft: rope },
  { asset: 'millWheel', category: 'set', version: 4, draft: millWheel },
  { asset: 'arch', category: 'set', version: 1, draft: arch },
  { asset: 'bridge', category: 'set', version: 1, draft: () => bridge(6) },
  { asset: 'bridge', category: 'set', version: 2, draft: () => bridge(7) },
  { asset: 'bridge', category: 'set', version: 3, draft: () => bridge(7), damage: nameMissingVertex },
  { asset: 'sign', category: 'set', version: 1, draft: sign },
  { asset: 'boulders', category: 'set', version: 2, draft: boulders },
];

/**
 * The demo show's files as its modellers left them, oldest version first: OBJ text in centimetres, y up, parts as groups.
 * Pure and deterministic. Three are what they are on purpose: tarnOx_v013 (a hump), millRat_v002 (shin_R inside out),
 * bridge_v003 (a face names a vertex that does not exist).
 */
export function demoFiles(): DemoFile[] {
  return VERSIONS.map(({ asset, category, version, draft, damage }) => {
    const name = `${asset}_v${String(version).padStart(3, '0')}`;
    const text = draft().toObj(name);
    return { path: `${category}/${asset}/${name}.obj`, category, text: damage ? damage(text) : text };
  });
}

import { describe, expect, it } from 'vitest';
import { MESH_EXTENSIONS } from '@/lib/formats/mesh-extensions';
import { filesOfArchive, summariseArchive, unpackedPath } from '@/lib/rules/archive-preview';
import { previewImport } from '@/lib/rules/import-preview';

const entriesOf = (...names: string[]) => names.map((name) => ({ name, bytes: 10, packedBytes: 5 }));
const inside = (...names: string[]) => filesOfArchive(entriesOf(...names), MESH_EXTENSIONS);

describe('a dropped archive before anything goes up', () => {
  it('is one asset with one mesh and what lies beside it, and several files otherwise', () => {
    expect(inside('ox_v012.obj', 'ox_v012.weights.csv', 'readme.txt')).toBeNull();
    expect(inside('notes.txt')).toBeNull();
    expect(inside('b.obj', 'a/c.PLY', 'readme.txt')).toEqual(['a/c.PLY', 'b.obj']);
    expect(inside('rig.usdz')).toEqual(['rig.usdz']);
    expect(inside('lamp.gltf', 'lamp.bin')).toBeNull();
  });

  it('lays its files into a folder of its own name', () => {
    expect(unpackedPath('delivery/batch.ZIP', 'props/oar_v001.obj')).toBe('delivery/batch/props/oar_v001.obj');
  });

  it('says how many of its files become what, and which ones deserve a look first', () => {
    const entries = inside('props/oar_v001.obj', 'props/oar_v002.obj', 'props/v009/.obj', 'props/bell_v003.obj')!;
    const known = [{ asset: 'bell', category: 'prop' as const, versions: [1] }];
    const rows = previewImport(entries.map((entry) => ({ name: unpackedPath('batch.zip', entry) })), '{category}/{asset}_v{version}', known);
    const summary = summariseArchive(entries, rows);
    expect(summary.files).toBe(4);
    expect([...summary.outcomes].sort()).toEqual([['new_asset', 1], ['new_version', 2], ['unmatched', 1]]);
    expect(summary.attention).toBe(2);
    expect(summary.warnings[0].entry).toBe('props/v009/.obj');
    expect(summary.warnings.some(({ entry, words }) => entry === 'props/bell_v003.obj' && words.includes('Nothing between'))).toBe(true);
  });
});

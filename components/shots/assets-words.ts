import type { AssetInShot } from '@/lib/rules/shot-detail';

/** `tarnOx, lantern ×3`. */
export function assetsWords(assets: readonly AssetInShot[]): string {
  return assets.map(({ asset, copies }) => (copies > 1 ? `${asset} ×${copies}` : asset)).join(', ');
}

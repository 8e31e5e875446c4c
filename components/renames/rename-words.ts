import type { AbsentPart, AssetRenames, RenameProposal } from '@/lib/rules/part-rename';

const count = (many: number, one: string, several: string): string => (many === 1 ? one : `${many} ${several}`);

/** What goes on with a part when it gets another name. */
export function carriesWords({ has_setting, approvals, locks }: Pick<AbsentPart, 'has_setting' | 'approvals' | 'locks'>): string {
  const carried = [has_setting ? 'its mass' : null, approvals > 0 ? count(approvals, 'an approval', 'approvals') : null, locks > 0 ? count(locks, 'a lock', 'locks') : null].filter((words) => words !== null);
  return carried.length === 0 ? 'nothing set on it yet' : `keeps ${carried.join(', ')}`;
}

export function fitWords({ fit, others }: RenameProposal): string {
  const same = fit === 'place' ? 'same geometry, same place' : 'same geometry, moved or mirrored';
  return others === 0 ? same : `${same}; ${count(others, 'another one fits', 'others fit')} too`;
}

/** Parts of assets that may be told to be others: how many seem renamed, and how many are only gone. */
export function standingWords(items: readonly AssetRenames[]): string {
  const proposed = items.reduce((sum, one) => sum + one.proposals.length, 0);
  const where = items.length === 1 ? items[0].asset : `${items.length} assets`;
  if (proposed > 0) return `${count(proposed, '1 part', 'parts')} of ${where} ${proposed === 1 ? 'looks' : 'look'} renamed.`;
  const absent = items.reduce((sum, one) => sum + one.absent.length, 0);
  const arrived = items.reduce((sum, one) => sum + one.arrived.length, 0);
  return `${items.length === 1 ? `${items[0].version} of ${where} lacks` : `${where} lack`} ${count(absent, '1 part', 'parts')} and brought ${arrived}.`;
}

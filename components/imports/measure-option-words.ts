import type { PartitionWord, SchemeWord } from '@/lib/rules/measure-words';
import { PARTITION_NAMES, SCHEME_NAMES } from '@/lib/rules/show-words';

/** How an import's files are measured, in words. */
export function measureWords({ scheme, parts_by, weld, turn_faces }: { scheme: SchemeWord; parts_by: PartitionWord; weld: boolean; turn_faces: boolean }): string[] {
  return [
    scheme === 'polyhedral' ? 'The cage as it is' : SCHEME_NAMES[scheme],
    parts_by === 'whole' ? 'Each file one part' : `Parts by ${PARTITION_NAMES[parts_by].toLowerCase()}`,
    ...(turn_faces ? ['Faces turned outwards'] : []),
    ...(weld ? ['Open borders welded'] : []),
  ];
}

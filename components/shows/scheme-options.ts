import { SCHEME_WORDS, type SchemeWord } from '@/lib/rules/measure-words';
import { SCHEME_NAMES } from '@/lib/rules/show-words';

const RARE: readonly SchemeWord[] = ['loop', 'doo-sabin'];

/** The schemes to choose from: the rare ones only when they were asked for, or when one of them is chosen. */
export function schemeOptions(withRare: boolean, chosen: SchemeWord): { value: SchemeWord; label: string }[] {
  return SCHEME_WORDS.filter((word) => withRare || word === chosen || !RARE.includes(word)).map((value) => ({
    value,
    label: SCHEME_NAMES[value],
  }));
}

const SIDES: readonly (readonly [string, string])[] = [
  ['left', 'right'],
  ['lf', 'rt'],
  ['l', 'r'],
];
const PARTED = /[_.\-\s:|]/;

/** `like`'s case on `word`: LEFT, Left, left. */
function inCaseOf(like: string, word: string): string {
  if (like === like.toUpperCase()) return word.toUpperCase();
  if (like[0] === like[0].toUpperCase()) return word[0].toUpperCase() + word.slice(1);
  return word;
}

/** The same name on the other side, where one of its parted words is a side (L, lf, Left …); null where none is, or more than one. */
export function mirrorName(name: string): string | null {
  const words = name.split(new RegExp(`(${PARTED.source})`));
  const found = words.flatMap((word, index) => {
    const lower = word.toLowerCase();
    const pair = SIDES.find((sides) => sides.includes(lower));
    return pair === undefined ? [] : [{ index, other: inCaseOf(word, pair[0] === lower ? pair[1] : pair[0]) }];
  });
  if (found.length !== 1) return null;
  return words.map((word, index) => (index === found[0].index ? found[0].other : word)).join('');
}

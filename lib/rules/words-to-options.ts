/** Choices of a select out of a list of words and their names, in the list's order. */
export function wordsToOptions<Word extends string>(words: readonly Word[], names: Record<Word, string>): { value: Word; label: string }[] {
  return words.map((value) => ({ value, label: names[value] }));
}

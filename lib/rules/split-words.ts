/** Words of a text field that takes several: parted by commas, semicolons, spaces or lines, each once. */
export function splitWords(text: string): string[] {
  return [...new Set(text.split(/[\s,;]+/).filter(Boolean))];
}

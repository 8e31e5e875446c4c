import { doubtsUnit, type ImportFileAnswer } from './import-answer';

/** Where an error sits, as people say it; empty where the whole file is meant. */
export function placeWords(error: { line: number | null; column: number | null }): string {
  if (error.line === null) return '';
  return error.column === null ? `line ${error.line}` : `line ${error.line}, column ${error.column}`;
}

/** The failures and the files with problems as a message to whoever made them: plain text, one file a paragraph. */
export function noteToModelling(show: string, files: readonly ImportFileAnswer[], link: string): string {
  const failed = files.filter((file) => file.state === 'failed' && file.error?.code !== 'cancelled');
  const blocked = files.filter((file) => file.state === 'done' && (file.problems ?? 0) > 0);
  const odd = files.filter((file) => file.state === 'done' && file.remarks.some(doubtsUnit));
  const paragraphs = [
    ...(failed.length > 0 ? [`These files could not be read:`] : []),
    ...failed.map((file) => {
      const place = file.error ? placeWords(file.error) : '';
      return `${file.name}\n  ${place ? `${place}: ` : ''}${file.error?.message ?? ''}`;
    }),
    ...(blocked.length > 0 ? ['These were read, and have problems that leave parts without a mass:'] : []),
    ...blocked.map((file) => `${file.name}\n  ${file.problems === 1 ? '1 problem' : `${file.problems} problems`} in ${file.asset} ${file.version}`),
    ...(odd.length > 0 ? ['These have a size that does not look right. Check the unit on export:'] : []),
    ...odd.map((file) => `${file.name}\n  ${Math.max(...(file.size_m ?? [0])).toPrecision(3)} m at the longest side`),
  ];
  if (paragraphs.length === 0) return '';
  return [`${show}: files to look at`, ...paragraphs, link, ''].join('\n\n').trimEnd() + '\n';
}

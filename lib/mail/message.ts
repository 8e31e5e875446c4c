/** What a template makes of the facts: the same words as plain text and as HTML. */
export interface Message {
  subject: string;
  text: string;
  html: string;
}

export function escapeHtml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}

/** A piece of a message: a paragraph, a heading, lines of a list, or a link to follow. */
export type Block = string | { heading: string } | { list: readonly string[] } | { label: string; url: string };

/** Paragraphs and one link to follow, as text and as HTML that needs neither images nor style sheets. Line breaks leave the subject. */
export function composeMessage(subject: string, before: string[], link: { label: string; url: string } | null, after: string[]): Message {
  return composeBlocks(subject, [...before, ...(link ? [link] : []), ...after]);
}

/** The same of any pieces in their order; an empty list leaves nothing behind. */
export function composeBlocks(subject: string, blocks: readonly Block[]): Message {
  const shown = blocks.filter((block) => typeof block === 'string' || !('list' in block) || block.list.length > 0);
  return {
    subject: subject.replace(/\s+/g, ' ').trim(),
    text: shown.map(asText).join('\n\n') + '\n',
    html: `<!doctype html>\n<html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(subject)}</title></head>\n<body style="font:15px/22px sans-serif;max-width:36em;margin:24px">\n${shown.map(asHtml).join('\n')}\n</body></html>\n`,
  };
}

function asText(block: Block): string {
  if (typeof block === 'string') return block;
  if ('heading' in block) return `${block.heading}\n${'-'.repeat([...block.heading].length)}`;
  if ('list' in block) return block.list.map((line) => `- ${line}`).join('\n');
  return `${block.label}:\n${block.url}`;
}

function asHtml(block: Block): string {
  if (typeof block === 'string') return `<p style="margin:0 0 16px">${escapeHtml(block)}</p>`;
  if ('heading' in block) return `<h2 style="font-size:17px;margin:24px 0 8px">${escapeHtml(block.heading)}</h2>`;
  if ('list' in block) return `<ul style="margin:0 0 16px;padding-left:20px">${block.list.map((line) => `<li>${escapeHtml(line)}</li>`).join('')}</ul>`;
  return `<p style="margin:0 0 16px"><a href="${escapeHtml(block.url)}">${escapeHtml(block.label)}</a></p>`;
}

/** What a template makes of the facts: the same words as plain text and as HTML. */
export interface Message {
  subject: string;
  text: string;
  html: string;
}

export function escapeHtml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}

/** Paragraphs and one link to follow, as text and as HTML that needs neither images nor style sheets. Line breaks leave the subject. */
export function composeMessage(subject: string, before: string[], link: { label: string; url: string } | null, after: string[]): Message {
  const paragraph = (text: string) => `<p style="margin:0 0 16px">${escapeHtml(text)}</p>`;
  const anchor = link ? [`<p style="margin:0 0 16px"><a href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>`] : [];
  const body = [...before.map(paragraph), ...anchor, ...after.map(paragraph)].join('\n');
  return {
    subject: subject.replace(/\s+/g, ' ').trim(),
    text: [...before, ...(link ? [`${link.label}:\n${link.url}`] : []), ...after].join('\n\n') + '\n',
    html: `<!doctype html>\n<html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(subject)}</title></head>\n<body style="font:15px/22px sans-serif;max-width:36em;margin:24px">\n${body}\n</body></html>\n`,
  };
}

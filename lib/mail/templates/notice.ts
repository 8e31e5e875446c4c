import type { NoticeText } from '@/db/schema/notices';
import { composeBlocks, type Block, type Message } from '../message';

/** Tells one thing at once. */
export function noticeMail(facts: { name: string; text: NoticeText; baseUrl: string }): Message {
  const { name, text, baseUrl } = facts;
  return composeBlocks(text.subject, [`Hello ${name},`, ...noticeBlocks(text, baseUrl), `${text.why} ${choiceWords(baseUrl)}`]);
}

/** Tells everything that waited since the last digest, by show. */
export function digestMail(facts: { name: string; shows: readonly { title: string; texts: readonly NoticeText[] }[]; baseUrl: string }): Message {
  const { name, shows, baseUrl } = facts;
  const all = shows.flatMap((show) => show.texts);
  const where = shows.length === 1 ? shows[0].title : `${shows.length} shows`;
  const subject = all.length === 1 ? all[0].subject : `${all.length} things happened in ${where}`;
  const blocks = shows.flatMap(({ title, texts }): Block[] => [{ heading: title }, ...texts.flatMap((text) => noticeBlocks(text, baseUrl))]);
  return composeBlocks(subject, [`Hello ${name},`, ...blocks, `This is what happened since your last mail. ${choiceWords(baseUrl)}`]);
}

function noticeBlocks(text: NoticeText, baseUrl: string): Block[] {
  return [...text.lines, { list: text.list }, { label: text.label, url: new URL(text.path, baseUrl).href }];
}

function choiceWords(baseUrl: string): string {
  return `What mail you get is your choice: ${new URL('/account', baseUrl).href}`;
}

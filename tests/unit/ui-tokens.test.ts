import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const source = readFileSync(new URL('../../components/ui/tokens.css', import.meta.url), 'utf8');
const GROUNDS = ['ground', 'bench', 'raised', 'selected'];
const NEEDED = { text: 4.5, shape: 3 };

interface Token {
  name: string;
  light: string;
  dark: string;
  remark: string;
}

const tokens: Token[] = source.split('\n').flatMap((line) => {
  const found = /--([\w-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\);(?:\s*\/\* (.*) \*\/)?/.exec(line);
  return found ? [{ name: found[1], light: found[2], dark: found[3], remark: found[4] ?? '' }] : [];
});
const token = (name: string) => tokens.find((one) => one.name === name)!;

/** WCAG 2.2, relative luminance of an sRGB colour. */
function luminance(colour: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [high, low] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (high + 0.05) / (low + 0.05);
}

describe('contrast', () => {
  it('of black on white is 21, as WCAG 2.2 defines it', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
  });

  const pairs = tokens
    .filter((one) => /^(text|shape) \d/.test(one.remark))
    .flatMap((one) =>
      (['light', 'dark'] as const).flatMap((theme, side) =>
        GROUNDS.map((ground, index) => ({
          name: `${one.name} on ${ground}, ${theme}`,
          measured: contrast(one[theme], token(ground)[theme]),
          written: Number(one.remark.replace(/^\w+ /, '').split(' | ')[side].split(' · ')[index]),
          needed: NEEDED[one.remark.startsWith('text') ? 'text' : 'shape'],
        })),
      ),
    );

  it('is written for every ink', () => {
    expect(pairs).toHaveLength(8 * 2 * 4);
  });

  it.each(pairs)('of $name is enough and as written', ({ measured, written, needed }) => {
    expect(measured).toBeGreaterThanOrEqual(needed);
    expect(Math.abs(measured - written)).toBeLessThan(0.01);
  });

  it.each(['light', 'dark'] as const)('of the filled button is enough, %s', (theme) => {
    expect(contrast(token('on-brass')[theme], token('brass')[theme])).toBeGreaterThanOrEqual(4.5);
  });
});

/**
 * Every text of the product can be read and every mark be seen, by day, by night and on paper.
 *
 * Contrast is WCAG 2.2's: relative luminance from linear sRGB, (lighter + 0.05) / (darker + 0.05); 4.5 for text
 * (success criterion 1.4.3), 3 for marks and borders that mean something (1.4.11).
 */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';

const TOKENS = ['paper', 'sheet', 'ink', 'ink-2', 'hair', 'land', 'shoal', 'shelf', 'magenta'] as const;
type Token = (typeof TOKENS)[number];
type Scheme = Readonly<Record<Token, string>>;

/** Text colour on ground. Land, shoal, shelf and hair are areas; no text stands on shoal. */
const TEXT_PAIRS: readonly [Token, Token][] = [
  ['ink', 'paper'],
  ['ink', 'sheet'],
  ['ink', 'shelf'],
  ['ink', 'land'],
  ['ink-2', 'paper'],
  ['ink-2', 'sheet'],
  ['ink-2', 'shelf'],
  ['magenta', 'paper'],
  ['magenta', 'sheet'],
  ['magenta', 'shelf'],
  ['sheet', 'ink'],
  ['sheet', 'ink-2'],
];

/** Lines, rings, diamonds, field borders, focus: what is drawn, on what it is drawn. */
const MARK_PAIRS: readonly [Token, Token][] = [
  ['ink', 'paper'],
  ['ink', 'sheet'],
  ['ink', 'shelf'],
  ['ink', 'land'],
  ['ink', 'shoal'],
  ['ink-2', 'paper'],
  ['ink-2', 'sheet'],
  ['magenta', 'sheet'],
  ['magenta', 'paper'],
  ['magenta', 'shelf'],
  ['magenta', 'land'],
  ['magenta', 'shoal'],
];

const css = readFileSync(new URL('../../src/styles/tokens.css', import.meta.url), 'utf8');

/** The blocks that set colours, by their selector. */
function schemes(): ReadonlyMap<string, Scheme> {
  const blocks = css.matchAll(/([^{};/]+)\{([^{}]*--color-paper:[^{}]*)\}/g);
  return new Map(
    [...blocks].map(([, selector = '', body = '']) => [
      selector.trim().replaceAll(/\s+/g, ' '),
      Object.fromEntries(TOKENS.map((token) => [token, colourIn(body, token)])) as Scheme,
    ]),
  );
}

function colourIn(body: string, token: Token): string {
  const colour = new RegExp(`--color-${token}:\\s*(#[0-9a-f]{6})`, 'i').exec(body)?.[1];
  if (colour === undefined) throw new Error(`tokens.css: --color-${token} is missing in a scheme`);
  return colour;
}

function luminance(colour: string): number {
  const [red, green, blue] = [1, 3, 5].map((at) => {
    const channel = parseInt(colour.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string): number {
  const [darker, lighter] = [luminance(one), luminance(other)].sort((a, b) => a - b) as [number, number];
  return (lighter + 0.05) / (darker + 0.05);
}

/** A colour drawn with this opacity over a ground, as sRGB is mixed by a browser. */
function mixed(colour: string, ground: string, opacity: number): string {
  const channels = [1, 3, 5].map((at) => {
    const [over, under] = [colour, ground].map((hex) => parseInt(hex.slice(at, at + 2), 16)) as [
      number,
      number,
    ];
    return Math.round(over * opacity + under * (1 - opacity))
      .toString(16)
      .padStart(2, '0');
  });
  return `#${channels.join('')}`;
}

function leadOpacity(): number {
  const marks = readFileSync(new URL('../../src/styles/marks.css', import.meta.url), 'utf8');
  const opacity = /\.strip-lead\s*\{[^}]*stroke-opacity:\s*([\d.]+)/.exec(marks)?.[1];
  if (opacity === undefined) throw new Error('marks.css: .strip-lead names no stroke-opacity');
  return Number(opacity);
}

test('contrast is computed as WCAG defines it', () => {
  // 21:1 is the definition's largest value; #767676 on white is the well-known last grey above 4.5 (4.54).
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
  expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  expect(contrast('#777777', '#ffffff')).toBeLessThan(4.5);
});

test('day, both nights and paper are set, and the night by switch is the night by system', () => {
  const all = schemes();
  expect([...all.keys()]).toEqual([
    '@theme',
    ":root:not([data-scheme='day'])",
    ":root[data-scheme='night']",
    ":root, :root[data-scheme], :root:not([data-scheme='day'])",
  ]);
  expect(all.get(":root[data-scheme='night']")).toEqual(all.get(":root:not([data-scheme='day'])"));
  expect(all.get('@theme')).not.toEqual(all.get(":root[data-scheme='night']"));
});

describe.each([...schemes()])('%s', (_selector, scheme) => {
  test.each(TEXT_PAIRS)('text in %s on %s can be read', (text, ground) => {
    expect(contrast(scheme[text], scheme[ground])).toBeGreaterThanOrEqual(4.5);
  });

  test.each(MARK_PAIRS)('a mark in %s on %s can be seen', (mark, ground) => {
    expect(contrast(scheme[mark], scheme[ground])).toBeGreaterThanOrEqual(3);
  });

  test('the lead line of a sounding, drawn thin, can still be seen on a sheet', () => {
    expect(
      contrast(mixed(scheme['ink-2'], scheme.sheet, leadOpacity()), scheme.sheet),
    ).toBeGreaterThanOrEqual(3);
  });
});

test('no style sheet names a colour outside the tokens', () => {
  const sheets = ['global', 'type', 'topBar', 'layout', 'controls', 'forms', 'tables', 'marks', 'print'];
  const named = sheets.flatMap((name) => {
    const text = readFileSync(new URL(`../../src/styles/${name}.css`, import.meta.url), 'utf8');
    return [
      ...text.matchAll(/#[0-9a-f]{3,8}\b|\b(?:rgb|hsl|oklch)a?\(|gradient\(|box-shadow|border-radius/gi),
    ].map(([found]) => `${name}.css: ${found}`);
  });
  expect(named).toEqual([]);
});

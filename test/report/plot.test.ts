import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { plotAddress, plotSvg, type Plot } from '../../server/src/report/plot';

const plot = (more: Partial<Plot> = {}): Plot => ({
  title: 'twist^2 against the cutoff',
  description: 'It grows.',
  x: [10, 20, 40, 400],
  xLabel: 'cutoff L',
  yLabel: 'Re T',
  curves: [
    { name: 'bare', y: [-0.7, -1.5, -3.1, -31] },
    { name: 'renormalised', y: [0, 0, 0, 0] },
  ],
  ...more,
});

/** Names of the elements if the text is well-formed XML without entities of its own; throws otherwise. */
function elements(svg: string): string[] {
  const names: string[] = [];
  const open: string[] = [];
  const rest = svg.replace(
    /<(\/?)([a-z]+)((?: [a-zA-Z:-]+="[^"<&]*(?:&#\d+;[^"<&]*)*")*)(\/?)>/g,
    (_, closing: string, name: string, __, empty: string) => {
      if (closing) {
        if (open.pop() !== name) throw new Error(`</${name}> closes another element`);
      } else {
        names.push(name);
        if (!empty) open.push(name);
      }
      return '';
    },
  );
  if (open.length > 0 || /[<>]|&(?!#\d+;)/.test(rest)) throw new Error(`not well-formed: ${rest}`);
  return names;
}

describe('a plot', () => {
  test('is an image with a title and a description', () => {
    const svg = plotSvg(plot());
    expect(elements(svg).slice(0, 3)).toEqual(['svg', 'title', 'desc']);
    expect(svg).toMatch(/^<svg [^>]*role="img"/);
    expect(svg).toContain('<title id="t">twist^2 against the cutoff</title><desc id="d">It grows.</desc>');
  });

  test('tells its curves apart by dash as well as colour', () => {
    const curves = [...plotSvg(plot()).matchAll(/<path d="M[^"]*L[^"]*"[^>]*stroke="(#\w+)"[^>]*?(stroke-dasharray="[^"]*")?\/>/g)];
    expect(curves).toHaveLength(2);
    expect(curves[0][1]).not.toBe(curves[1][1]);
    expect(curves.map(([, , dash]) => dash === undefined)).toEqual([true, false]);
  });

  test('marks the cutoff of the model only where the axis has it', () => {
    expect(plotSvg(plot({ mark: { x: 40, label: 'L = 40' } }))).toContain('>L = 40</text>');
    expect(plotSvg(plot({ mark: { x: 1000, label: 'L = 1000' } }))).not.toContain('L = 1000');
  });

  test('leaves a gap where a value is missing', () => {
    const svg = plotSvg(plot({ x: [1, 2, 3, 4, 5], curves: [{ name: 'bare', y: [1, 2, NaN, 3, 4] }] }));
    expect(/<path d="(M[^"]*)"[^>]*stroke="#d9662b"/.exec(svg)![1].match(/M/g)).toHaveLength(2);
  });

  test('is nothing where there is nothing to draw', () => {
    for (const more of [
      { x: [], curves: [] },
      { x: [10], curves: [{ name: 'bare', y: [1] }] },
      { curves: [{ name: 'bare', y: [NaN, NaN] }] },
    ]) {
      expect(plotSvg(plot(more))).toBe('');
      expect(plotAddress(plot(more))).toBe('');
    }
  });

  test('is well-formed and without NaN, whatever it is given', () => {
    const points = fc.array(fc.tuple(fc.double(), fc.double()), { maxLength: 30 });
    fc.assert(
      fc.property(points, fc.string({ unit: 'grapheme' }), (pairs, words) => {
        const svg = plotSvg(
          plot({
            x: pairs.map(([x]) => x),
            curves: [{ name: words, y: pairs.map(([, y]) => y) }],
            title: words,
            description: words,
            yLabel: words,
          }),
        );
        if (svg !== '') expect(elements(svg)[0]).toBe('svg');
        const numbers = [...svg.matchAll(/ (?:d|x|y)="([^"]*)"/g)].map(([, value]) => value);
        expect(numbers.filter(value => /NaN|Infinity|undefined/.test(value))).toEqual([]);
      }),
    );
  });

  test('as an address is the same picture', () => {
    const [, data] = plotAddress(plot()).split('base64,');
    expect(plotAddress(plot())).toMatch(/^data:image\/svg\+xml;base64,[A-Za-z0-9+/=]+$/);
    expect(Buffer.from(data, 'base64').toString('utf8')).toBe(plotSvg(plot()));
  });
});

import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { highestOrder } from '../../server/src/language/document';
import { readSettings, standardSettings } from '../../server/src/session/settings';

interface Property {
  readonly default: number;
  readonly maximum?: number;
}
const manifest = JSON.parse(readFileSync(join(import.meta.dirname, '../../package.json'), 'utf8')) as {
  contributes: { configuration: { properties: Record<string, Property> } };
};

test('the editor shows the standard settings', () => {
  const { properties } = manifest.contributes.configuration;
  const shown = Object.fromEntries(Object.entries(properties).map(([name, property]) => [name, property.default]));
  const { defaults, keystrokeBudget } = standardSettings;
  expect(shown).toEqual({ 'tare.cutoff': defaults.cutoff, 'tare.order': defaults.order, 'tare.keystrokeBudget': keystrokeBudget });
  expect(properties['tare.order'].maximum).toBe(highestOrder);
});

test('good settings are taken', () => {
  expect(readSettings({ cutoff: 2.5, order: 4, keystrokeBudget: 1e6 })).toEqual({
    settings: { defaults: { cutoff: 2.5, order: 4 }, keystrokeBudget: 1e6 },
    complaints: [],
  });
});

test.each([
  ['cutoff', 0],
  ['cutoff', -1],
  ['cutoff', '40'],
  ['order', 2.5],
  ['order', 0],
  ['order', 50],
  ['keystrokeBudget', 0],
])('%s = %j is replaced and complained about', (name, value) => {
  const { settings, complaints } = readSettings({ [name]: value });
  expect(settings).toEqual(standardSettings);
  expect(complaints).toEqual([expect.stringContaining(`tare.${name} is ${JSON.stringify(value)}, but it must be`)]);
});

test('whatever an editor sends, the settings can be used', () => {
  fc.assert(
    fc.property(fc.anything(), section => {
      const { settings } = readSettings(section);
      expect(settings.defaults.cutoff).toBeGreaterThan(0);
      expect(Number.isInteger(settings.defaults.order)).toBe(true);
      expect(settings.keystrokeBudget).toBeGreaterThan(0);
    }),
  );
});

import { existsSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { DiagnosticSeverity, type Position } from 'vscode-languageserver-protocol/node';
import { Client, type ClientOptions, applied, positionOf } from './client';

const uri = 'file:///models/wire.tare';
const wire = `model defect_in_a_wire {
  dimension 1
  mass reduced 1.0
  coupling c0 = 0.20
  coupling c1 = 0.35
  interaction bump(p, k)  = c0
  interaction twist(p, k) = i*c1*(p - k)
  cutoff L = 40 sharp scan 10 .. 400 (6 points)
  series to 2 at p = 0.05, 0.1
}
`;
const twist = { start: positionOf(wire, 'twist'), end: positionOf(wire, 'twist', 5) };

let client: Client;
const start = async (options: ClientOptions = {}): Promise<Client> => {
  client = new Client(options);
  await client.start();
  return client;
};
afterEach(async () => {
  expect(await client.stop()).toBe(0);
});

test('it says what it can do', async () => {
  client = new Client();
  const { capabilities, serverInfo } = await client.start();
  expect(serverInfo).toMatchObject({ name: 'tare' });
  expect(capabilities).toMatchObject({
    positionEncoding: 'utf-16',
    textDocumentSync: 2,
    hoverProvider: true,
    codeActionProvider: { codeActionKinds: ['quickfix'] },
  });
});

describe('diagnostics', () => {
  test('a divergence stands on the name of its interaction, with its severity, code, page and partners', async () => {
    await start();
    await client.open(uri, wire);
    const diagnostics = await client.complete(uri, 1);
    const divergence = diagnostics.find(({ code }) => code === 'uv-divergence')!;
    expect(divergence).toMatchObject({ range: twist, severity: DiagnosticSeverity.Error, source: 'tare' });
    expect(divergence.message).toContain('twist^2');
    expect(divergence.relatedInformation).toContainEqual(
      expect.objectContaining({
        location: expect.objectContaining({ uri, range: { start: positionOf(wire, 'bump'), end: positionOf(wire, 'bump', 4) } }) as object,
      }),
    );
    const page = new URL(divergence.codeDescription!.href);
    expect(page.hash).toBe('#uv-divergence');
    expect(existsSync(fileURLToPath(new URL(page.pathname, page)))).toBe(true);
  });

  test('follow edits, count in UTF-16 and go away with the document', async () => {
    await start();
    await client.open(uri, wire);
    await client.diagnostics(uri);
    const inOneLine = `const 𝛬 = 1 ${wire.replaceAll('\n', ' ')}`;
    await client.change(uri, 2, { text: inOneLine });
    const diagnostics = await client.complete(uri, 2);
    expect(diagnostics.find(({ code }) => code === 'uv-divergence')!.range.start).toEqual({
      line: 0,
      character: inOneLine.indexOf('twist'),
    });

    const bump = { start: positionOf(inOneLine, 'bump'), end: positionOf(inOneLine, 'bump', 4) };
    await client.change(uri, 3, { range: bump, text: 'twist' });
    const renamed = await client.diagnostics(uri, ({ version }) => version === 3);
    expect(renamed.map(({ code }) => code)).toContain('duplicate');
    await client.close(uri);
    expect(await client.diagnostics(uri, ({ diagnostics }) => diagnostics.length === 0)).toEqual([]);
  });

  test('a model that is being edited never shows the verdict of an older text', async () => {
    await start();
    await client.open(uri, wire);
    const contacts = wire.replace('i*c1*(p - k)', 'c1');
    for (let version = 2; version <= 30; version++) {
      await client.change(uri, version, { text: version % 2 ? wire : contacts });
      // Some edits follow at once, some when the answer to the last one is there, and some while its numbers are on their way.
      if (version % 3 > 0) await client.diagnostics(uri, params => params.version === version);
      if (version % 3 > 1) await sleep(5 * version);
    }
    await client.diagnostics(uri, params => params.version === 30);
    for (const { version, diagnostics } of client.published) {
      const diverges = diagnostics.some(({ code }) => /divergence/.test(String(code)));
      expect(diverges, `version ${version}`).toBe(version! % 2 === 1);
    }
  });
});

describe('hover', () => {
  const hoverWhenComplete = async (): Promise<string> => {
    await client.open(uri, wire);
    for (let tries = 0; tries < 200; tries++) {
      const hover = await client.hover(uri, twist.start);
      const { value } = hover!.contents as { value: string };
      expect(hover!.range).toEqual(twist);
      if (value.includes('data:image') || value.includes('400')) return value;
      await sleep(50);
    }
    throw new Error('the numbers never came');
  };

  test('shows an image to a client that asks for images', async () => {
    await start({ initializationOptions: { images: true } });
    const markdown = await hoverWhenComplete();
    expect(markdown).toContain('](data:image/svg+xml;base64,');
    expect(markdown.length).toBeLessThan(100_000);
  });

  test('shows a table to any other', async () => {
    await start();
    expect(await hoverWhenComplete()).not.toContain('data:image');
  });
});

describe('quick fixes', () => {
  test('are linked to the diagnostic, one of them preferred, and leave a model that is finite', async () => {
    await start();
    await client.open(uri, wire);
    const diagnostics = await client.complete(uri, 1);
    const divergence = diagnostics.find(({ code }) => code === 'uv-divergence')!;
    const actions = await client.actions(uri, twist, diagnostics);
    expect(actions.length).toBeGreaterThan(1);
    for (const { kind, title } of actions) expect([kind, title]).toEqual(['quickfix', expect.any(String)]);
    const preferred = actions.filter(({ isPreferred }) => isPreferred);
    expect(preferred).toHaveLength(1);
    expect(preferred[0].diagnostics).toContainEqual(divergence);

    await client.change(uri, 2, { text: applied(wire, preferred[0]) });
    const after = await client.complete(uri, 2);
    expect(after.filter(({ severity }) => severity === DiagnosticSeverity.Error)).toEqual([]);
  });

  test('are not given to a client that wants other actions', async () => {
    await start();
    await client.open(uri, wire);
    await client.complete(uri, 1);
    expect(await client.actions(uri, twist, [], ['refactor'])).toEqual([]);
    expect(await client.actions(uri, twist, [], ['quickfix'])).not.toEqual([]);
  });
});

describe('settings', () => {
  const open = wire.replace(/ {2}series.*\n/, '');
  const capabilities = { workspace: { configuration: true, didChangeConfiguration: { dynamicRegistration: true } } };
  const ordersDiverge = ({ diagnostics }: { diagnostics: { code?: unknown }[] }): boolean =>
    diagnostics.some(({ code }) => code === 'uv-divergence');

  test('the order comes from the client and may change', async () => {
    await start({ capabilities, initializationOptions: { settings: { order: 1 } }, settings: { order: 1 } });
    await client.open(uri, open);
    expect(ordersDiverge({ diagnostics: await client.diagnostics(uri) })).toBe(false);
    client.settings = { order: 2 };
    await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    await client.diagnostics(uri, ordersDiverge);
  });

  test('a client that cannot be asked sends them', async () => {
    await start();
    await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: { tare: { order: 1, cutoff: -3 } } });
    await client.open(uri, open);
    expect(ordersDiverge({ diagnostics: await client.diagnostics(uri) })).toBe(false);
    expect(client.messages).toEqual([expect.stringContaining('tare.cutoff is -3')]);
  });
});

describe('any request at any place', () => {
  beforeEach(async () => {
    await start();
    await client.open(uri, wire);
  });
  const coordinate = fc.oneof(fc.integer({ min: 0, max: 60 }), fc.constantFrom(-1, 2 ** 31 - 1));
  const position: fc.Arbitrary<Position> = fc.record({ line: coordinate, character: coordinate });

  test('is answered', async () => {
    await fc.assert(
      fc.asyncProperty(position, position, async (a, b) => {
        const hover = await client.hover(uri, a);
        expect(hover === null || typeof hover === 'object').toBe(true);
        expect(Array.isArray(await client.actions(uri, { start: a, end: b }))).toBe(true);
      }),
    );
  });

  test('in a document that is not open, or broken anyhow, too', async () => {
    expect(await client.hover('file:///nowhere.tare', { line: 3, character: 3 })).toBeNull();
    expect(await client.actions('file:///nowhere.tare', twist)).toEqual([]);
    let version = 1;
    await fc.assert(
      fc.asyncProperty(fc.nat(wire.length), fc.nat(wire.length), fc.string(), position, async (a, b, inserted, place) => {
        await client.change(uri, ++version, { text: wire.slice(0, Math.min(a, b)) + inserted + wire.slice(Math.max(a, b)) });
        await client.hover(uri, place);
        await client.actions(uri, { start: place, end: place });
      }),
    );
    expect(await client.hover(uri, { line: 0, character: 0 })).toBeDefined();
  });
});

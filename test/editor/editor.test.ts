import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { shownWidth } from './inPage.js';
import { check, fillWorkspace, obstacle, output, packExtension, packInsideSuite } from './machine';
import { type EditorServer, startEditorServer } from './server';
import { Workbench, openBrowser } from './workbench';

if (obstacle) console.log(`SKIPPED: the tests in a real editor: ${obstacle}`);

describe.skipIf(obstacle)('in a real editor', () => {
  let server: EditorServer;
  let browser: Browser;

  beforeAll(async () => {
    server = await startEditorServer(packExtension());
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
  });

  test('a divergence is seen, understood, cured and saved', async ({ onTestFailed }) => {
    const workspace = server.newFolder();
    fillWorkspace(workspace);
    const file = join(workspace, 'wire.tare');
    writeFileSync(file, withoutCounterterm(readFileSync(file, 'utf8')));
    expect(check(file)).toMatchObject({ exit: 1 });

    const workbench = await Workbench.open(browser, server.address, workspace, 'wire.tare');
    onTestFailed(() => workbench.screenshot('failed'));
    await workbench.squiggles.first().waitFor({ timeout: 60_000 });
    await workbench.screenshot('1-squiggle');

    const hover = await workbench.hover('twist', 'img');
    await expect.poll(() => hover.locator('img').first().evaluate(shownWidth)).toBeGreaterThan(100);
    await hover.locator('img').first().scrollIntoViewIfNeeded();
    await workbench.screenshot('2-hover');

    await hover.getByRole('link', { name: 'uv-divergence' }).click();
    await workbench.webview.getByRole('heading', { name: 'uv-divergence' }).waitFor();
    await workbench.screenshot('3-what-it-means');
    await workbench.page.locator('.tab', { hasText: 'wire.tare' }).click();

    const fixes = await workbench.openQuickFixes('twist');
    await workbench.screenshot('4-quick-fixes');
    expect(fixes.filter(title => title.startsWith('Add counterterm')).length).toBeGreaterThan(0);
    await workbench.takeQuickFix('Add counterterm');
    await workbench.squiggles.first().waitFor({ state: 'detached' });
    await workbench.screenshot('5-clean');

    await workbench.save();
    expect(readFileSync(file, 'utf8')).toMatch(/counterterm \w+.* cancels twist\^2/);
    expect(check(file)).toMatchObject({ exit: 0 });
    await workbench.page.close();
  });

  test('every sample shows what the command line reports', async () => {
    const workspace = server.newFolder();
    fillWorkspace(workspace);
    const { code, log } = await runInside(workspace, await packInsideSuite());
    expect(code, log).toBe(0);
    expect(log).toContain('agrees wire.tare');
  });

  /** Has the editor run a suite in its extension host, with a folder that holds no extension as the one under development. */
  async function runInside(workspace: string, suite: string): Promise<{ code: number; log: string }> {
    const empty = join(output, 'no-extension');
    mkdirSync(empty, { recursive: true });
    writeFileSync(join(empty, 'main.js'), 'exports.activate = () => {};\n');
    const manifest = { name: 'nothing', publisher: 'tare-physics', version: '0.0.1', engines: { vscode: '^1.100.0' }, main: './main.js' };
    writeFileSync(join(empty, 'package.json'), JSON.stringify(manifest));

    const page = await browser.newPage();
    let log = '';
    await page.exposeFunction('codeAutomationLog', (_: string, parts: unknown[]) => {
      log += `${parts.join(' ')}\n`;
    });
    const ended = new Promise<number>(resolve => void page.exposeFunction('codeAutomationExit', resolve));
    const remote = (path: string): string => `vscode-remote://${new URL(server.address).host}${path}`;
    const payload = JSON.stringify([
      ['extensionDevelopmentPath', remote(empty)],
      ['extensionTestsPath', remote(suite)],
    ]);
    await page.goto(`${server.address}/?folder=${encodeURIComponent(workspace)}&payload=${encodeURIComponent(payload)}`);
    const code = await ended;
    await page.close();
    return { code, log };
  }
});

const withoutCounterterm = (text: string): string => text.replace(/^\s*counterterm .*\n/gm, '');

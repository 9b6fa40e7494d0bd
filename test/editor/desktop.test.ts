import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { runTests } from '@vscode/test-electron';
import { expect, test } from 'vitest';
import { fillWorkspace, packInsideSuite, root } from './machine';

const executable = process.env.VSCODE_EXECUTABLE;
if (!executable) {
  console.log('SKIPPED: the suite in a desktop editor. Set VSCODE_EXECUTABLE to the path of one; the same suite runs in the browser.');
}

test.skipIf(!executable)('every sample shows in a desktop editor what the command line reports', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'tare-desktop-'));
  const workspace = join(folder, 'workspace');
  fillWorkspace(workspace);
  const status = await runTests({
    vscodeExecutablePath: executable,
    extensionDevelopmentPath: root,
    extensionTestsPath: await packInsideSuite(),
    launchArgs: [workspace, '--disable-extensions', '--disable-workspace-trust', '--no-sandbox', `--user-data-dir=${join(folder, 'user')}`],
  });
  expect(status).toBe(0);
  rmSync(folder, { recursive: true });
});

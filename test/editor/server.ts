import { execFileSync, spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, openSync, rmSync, writeFileSync } from 'node:fs';
import { type AddressInfo, createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { codeServerEntry } from '../../scripts/codeServer.mjs';

const userSettings = {
  'workbench.startupEditor': 'none',
  'workbench.tips.enabled': false,
  'workbench.enableExperiments': false,
  'telemetry.telemetryLevel': 'off',
  'extensions.ignoreRecommendations': true,
  'update.mode': 'none',
  'files.hotExit': 'off',
  'files.autoSave': 'off',
  'git.enabled': false,
  'editor.hover.delay': 100,
};

/** One code-server with nothing of anybody's in it but our extension. */
export interface EditorServer {
  readonly address: string;
  /** An empty folder that goes away with the server. */
  newFolder(): string;
  stop(): Promise<void>;
}

/** Starts the editor on a free port with throw-away settings and the extension in `vsix` installed. */
export async function startEditorServer(vsix: string): Promise<EditorServer> {
  const root = mkdtempSync(join(tmpdir(), 'tare-editor-'));
  const inRoot = (name: string): string => join(root, name);
  mkdirSync(inRoot('user/User'), { recursive: true });
  writeFileSync(inRoot('user/User/settings.json'), JSON.stringify(userSettings));

  // No gallery; and not handed over to the window in whose terminal the tests may have been started.
  const env = { ...process.env, EXTENSIONS_GALLERY: '{"serviceUrl":""}', VSCODE_IPC_HOOK_CLI: undefined };
  const folders = ['--config', inRoot('config.yaml'), '--user-data-dir', inRoot('user'), '--extensions-dir', inRoot('extensions')];
  execFileSync(process.execPath, [codeServerEntry, ...folders, '--install-extension', vsix, '--force'], { env, stdio: 'pipe' });

  const port = await freePort();
  const log = openSync(inRoot('server.log'), 'a');
  const quiet = ['--disable-telemetry', '--disable-update-check', '--disable-workspace-trust', '--disable-getting-started-override'];
  const child = spawn(process.execPath, [codeServerEntry, '--bind-addr', `127.0.0.1:${port}`, '--auth', 'none', ...folders, ...quiet], {
    env,
    stdio: ['ignore', log, log],
    detached: true, // a process group of its own, which can be ended as a whole
  });
  const group = -child.pid!;
  const address = `http://127.0.0.1:${port}`;
  const stop = async (): Promise<void> => {
    // Extension hosts outlive their page, and take a few seconds to end.
    for (const signal of ['SIGTERM', 'SIGKILL'] as const) {
      for (let tries = 0; tries < 100 && isAlive(group); tries++) {
        if (tries === 0) process.kill(group, signal);
        await sleep(100);
      }
    }
    rmSync(root, { recursive: true, force: true, maxRetries: 3 });
  };
  for (let tries = 0; !(await isUp(address)); tries++) {
    if (child.exitCode !== null || tries > 600) {
      throw new Error(`code-server does not answer; see ${inRoot('server.log')}`);
    }
    await sleep(100);
  }
  return { address, newFolder: () => mkdtempSync(inRoot('workspace-')), stop };
}

const isUp = (address: string): Promise<boolean> =>
  fetch(`${address}/healthz`).then(
    answer => answer.ok,
    () => false,
  );

function isAlive(group: number): boolean {
  try {
    return process.kill(group, 0);
  } catch {
    return false;
  }
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer().once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address() as AddressInfo;
      server.close(() => resolve(port));
    });
  });
}

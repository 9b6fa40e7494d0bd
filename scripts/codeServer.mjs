// Installs the editor that the editor tests drive: code-server, pinned, into a cache outside the tree.
// Its own install scripts stay off (they refuse root and newer npm, and fetch ripgrep); what they would do is done here.
import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { homedir } from 'node:os';
import { dirname, join } from 'node:path';
import { onPath } from './debian.mjs';

export const version = '4.100.3';
const cache = process.env.TARE_CACHE ?? join(process.env.XDG_CACHE_HOME ?? join(homedir(), '.cache'), 'tare');
const root = join(cache, `code-server-${version}-node${process.versions.modules}`);
const stamp = join(root, 'complete');
const packageDir = join(root, 'node_modules', 'code-server');
/** The program that starts the editor; there once `installCodeServer` has returned. */
export const codeServerEntry = join(packageDir, 'out', 'node', 'entry.js');

export const isInstalled = () => existsSync(stamp) && readFileSync(stamp, 'utf8') === version;

/** Installs code-server unless it is there. Throws with what npm printed where it cannot. */
export function installCodeServer() {
  if (isInstalled()) return;
  console.log(`Installing code-server ${version} for the editor tests into ${root} (about a minute) …`);
  rmSync(root, { recursive: true, force: true });
  mkdirSync(root, { recursive: true });
  writeFileSync(join(root, 'package.json'), '{"private":true}\n');
  npm(root, 'install', '--no-package-lock', '--save-exact', `code-server@${version}`);

  const vscode = join(packageDir, 'lib', 'vscode');
  npm(vscode, 'install', '--omit=dev');
  npm(vscode, 'rebuild', '--ignore-scripts=false', '@vscode/spdlog', 'node-pty', 'native-watchdog');
  npm(root, 'rebuild', '--ignore-scripts=false', 'argon2');
  link('node_modules', join(vscode, 'node_modules.asar'));
  mkdirSync(join(vscode, 'node_modules', '@vscode', 'ripgrep', 'bin'), { recursive: true });
  link(onPath('rg'), join(vscode, 'node_modules', '@vscode', 'ripgrep', 'bin', 'rg'));
  execFileSync(process.execPath, [codeServerEntry, '--version'], { stdio: 'ignore' });
  writeFileSync(stamp, version);
}

function npm(cwd, command, ...args) {
  // The headers that came with Node, where they did: node-gyp would download them otherwise.
  const prefix = dirname(dirname(process.execPath));
  const headers = existsSync(join(prefix, 'include', 'node', 'node.h')) ? { npm_config_nodedir: prefix } : {};
  const scripts = command === 'install' ? ['--ignore-scripts'] : [];
  const env = { ...outsideNpm(process.env), ...headers, npm_config_yes: 'true', npm_config_audit: 'false', npm_config_fund: 'false' };
  try {
    execFileSync('npm', [command, ...scripts, ...args], {
      cwd,
      env,
      stdio: ['ignore', 'pipe', 'pipe'],
      encoding: 'utf8',
      maxBuffer: 1 << 28,
    });
  } catch (error) {
    throw new Error(`npm ${command} ${args.join(' ')} failed in ${cwd}:\n${String(error.stderr ?? error).slice(-3000)}`, {
      cause: error,
    });
  }
}

/** The environment without what an outer `npm run` puts there for its own package. */
function outsideNpm(env) {
  return Object.fromEntries(
    Object.entries(env).filter(([name]) => !/^npm_(package|lifecycle|command|config_(local_prefix|ignore_scripts))/.test(name)),
  );
}

function link(target, path) {
  rmSync(path, { recursive: true, force: true });
  symlinkSync(target, path);
}

if (process.argv[1] === import.meta.filename) {
  try {
    installCodeServer();
  } catch (error) {
    console.error(error.message);
    process.exitCode = 1;
  }
}

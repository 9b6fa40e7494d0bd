// Installs npm's packages where they are missing or belong to another lock file.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const root = join(import.meta.dirname, '..');
const stamp = join(root, 'node_modules', '.installed-from');

/** After this `node_modules` is what the lock file says. Ends the process where npm cannot do it. */
export function installNpmPackages() {
  const lock = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex');
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lock) return;
  console.log('Installing the packages of package-lock.json …');
  const { status } = spawnSync('npm', ['ci', '--ignore-scripts', '--no-audit', '--no-fund'], {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  if (status !== 0) {
    console.error('npm ci failed: is the registry of npm within reach?');
    process.exit(1);
  }
  writeFileSync(stamp, lock);
}

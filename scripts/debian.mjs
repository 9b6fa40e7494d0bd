// Debian's packages that the tests use beyond npm's: which are missing, and installing them where that is possible.
import { spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

/**
 * Where the program `name` stands, or null.
 * @param {string} name
 * @returns {string | null}
 */
export function onPath(name) {
  for (const folder of (process.env.PATH ?? '').split(delimiter)) {
    const path = join(folder, name);
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {
      // not in this folder
    }
  }
  return null;
}

/** @typedef {{ package: string, isThere: () => boolean }} Package */

/** @type {(name: string, command?: string) => Package} */
const program = (name, command = name) => ({ package: name, isThere: () => onPath(command) !== null });
/** @type {(name: string, path: string) => Package} */
const file = (name, path) => ({ package: name, isThere: () => existsSync(path) });

/**
 * What the tests in a real editor need: a browser, a font for the screenshots, and what code-server is built with.
 * @type {Package[]}
 */
export const editorPackages = [
  program('chromium'),
  file('fonts-dejavu-core', '/usr/share/fonts/truetype/dejavu/DejaVuSans.ttf'),
  program('ripgrep', 'rg'),
  program('python3'),
  program('make'),
  program('g++'),
];

/** What the scripts that wrote the reference values of test/outside run with. */
export const referencePackages = [
  file('python3-numpy', '/usr/lib/python3/dist-packages/numpy'),
  file('python3-scipy', '/usr/lib/python3/dist-packages/scipy'),
  file('python3-mpmath', '/usr/lib/python3/dist-packages/mpmath'),
  file('libgsl-dev', '/usr/include/gsl/gsl_version.h'),
];

/**
 * Installs those of `packages` that are missing, where apt-get is there and we are root.
 * Returns the names still missing afterwards.
 */
export function installDebianPackages(packages) {
  const missing = () => packages.filter(one => !one.isThere()).map(one => one.package);
  const wanted = missing();
  if (wanted.length === 0 || onPath('apt-get') === null || process.getuid?.() !== 0) return wanted;
  console.log(`Installing Debian's packages ${wanted.join(' ')} …`);
  const apt = (...args) =>
    spawnSync('apt-get', ['-qq', ...args], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    });
  apt('update');
  apt('install', '-y', '--no-install-recommends', ...wanted);
  return missing();
}

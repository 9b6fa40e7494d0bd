// What the tests in a real editor run with: a browser from Debian, code-server from npm.
import { installCodeServer } from './codeServer.mjs';
import { editorPackages, installDebianPackages } from './debian.mjs';

/** Installs what is missing. Returns null, or why those tests cannot run on this machine. */
export function installEditor() {
  if (process.platform !== 'linux') return 'they run on Linux only.';
  if (!process.versions.node.startsWith('20.')) return `the editor needs Node 20, and this is ${process.version}.`;
  const missing = installDebianPackages(editorPackages);
  if (missing.length > 0) return `not installed: ${missing.join(', ')}. As root on Debian: apt-get install ${missing.join(' ')}`;
  try {
    installCodeServer();
    return null;
  } catch (error) {
    return `code-server could not be installed. ${error.message}`;
  }
}

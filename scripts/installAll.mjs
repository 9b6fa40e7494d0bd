// For .ci/run: everything the tests can use, and no excuse for what is missing.
import { referencePackages, installDebianPackages } from './debian.mjs';
import { installEditor } from './editor.mjs';
import { installNpmPackages } from './npm.mjs';

installNpmPackages();
const missing = installDebianPackages(referencePackages);
const problem = missing.length > 0 ? `Not installed: ${missing.join(' ')}` : installEditor();
if (problem !== null) {
  console.error(problem);
  process.exit(1);
}

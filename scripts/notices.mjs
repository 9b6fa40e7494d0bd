// The licences of the packages that are bundled into dist/, as their authors ask for.
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** Writes the licences of every package among `inputs` (paths of bundled files) to `target`. */
export function writeNotices(root, inputs, target) {
  const folders = new Set(inputs.map(path => path.match(/^.*node_modules\/(@[^/]+\/)?[^/]+/)?.[0]).filter(Boolean));
  const notices = [...folders].sort().map(folder => {
    const { name, version, license } = JSON.parse(readFileSync(join(root, folder, 'package.json'), 'utf8'));
    const file = readdirSync(join(root, folder)).find(one => /^licen[cs]e/i.test(one) && existsSync(join(root, folder, one)));
    const text = file ? readFileSync(join(root, folder, file), 'utf8').trim() : `Licence: ${license}`;
    return `${name} ${version}\n\n${text}\n`;
  });
  writeFileSync(target, `Tare contains parts of these packages.\n\n${notices.join(`\n${'-'.repeat(80)}\n\n`)}`);
}

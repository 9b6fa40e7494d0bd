import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { fileFinding } from '../findings/file';
import type { Finding } from '../findings/finding';
import type { CheckedFile } from '../report/checked-file';
import { decodeUtf8 } from './utf8';

/** A file's text and what is wrong with its encoding, or why it has none: then what the report says about it. */
export type ReadFile =
  { readonly text: string; readonly sha256: string; readonly faults: readonly Finding[] } | { readonly unusable: CheckedFile };

/** A model file is written by hand; one above this many bytes is something else. */
const mostBytes = 4_000_000;

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'There is no such file.',
  EISDIR: 'This is a folder; name the model files in it.',
  EACCES: 'The file may not be read: permission is denied.',
  EPERM: 'The file may not be read: permission is denied.',
  ENOTDIR: 'There is no such file: a part of its path is no folder.',
  ELOOP: 'The file cannot be read: its links run in a circle.',
  ENAMETOOLONG: 'There is no such file: the name is too long.',
};

/**
 * Reads a file as UTF-8. Never throws: a file that cannot be read comes back with its finding. One that is no UTF-8 has a finding too; if it is
 * text at all it is read as Latin-1, so that the rest of it is still checked.
 */
export function readModelFile(path: string): ReadFile {
  let bytes: Buffer;
  try {
    bytes = readFileSync(path);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code ?? '';
    return { unusable: unusable(path, null, '', reasons[code] ?? `The file cannot be read (${code || 'unknown reason'}).`) };
  }
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  if (bytes.length > mostBytes) {
    return {
      unusable: unusable(
        path,
        sha256,
        '',
        `The file has ${(bytes.length / 1e6).toFixed(1)} MB; a model file may have at most ${mostBytes / 1e6} MB. Is it the right one?`,
      ),
    };
  }
  const decoded = decodeUtf8(bytes);
  if ('text' in decoded) return { text: decoded.text, sha256, faults: [] };
  const byte = `0x${bytes[decoded.badByte].toString(16).toUpperCase().padStart(2, '0')}`;
  const message = (guess: string) => `The file is not in UTF-8: the byte ${byte} stands here. ${guess} Save it as UTF-8.`;
  if (bytes.includes(0))
    return {
      unusable: unusable(path, sha256, bytes.toString('utf8'), message('It may be UTF-16, or no text at all.'), decoded.offset),
    };
  const at = decoded.badByte;
  const fault = fileFinding(message('It is read as Latin-1 here.'), { start: at, end: at + 1 });
  return { text: new TextDecoder('latin1').decode(bytes), sha256, faults: [fault] };
}

function unusable(path: string, sha256: string | null, text: string, message: string, at = 0): CheckedFile {
  return { path, sha256, text, checked: null, findings: [fileFinding(message, { start: at, end: Math.min(at + 1, text.length) })] };
}

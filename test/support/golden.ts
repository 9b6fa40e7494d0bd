import { readFileSync, writeFileSync } from 'node:fs';
import { expect } from 'vitest';

/** Compares with the file at `path`. It changes only where UPDATE_GOLDEN=1 is set, and a missing one fails. */
export function expectGolden(path: string, content: string): void {
  if (process.env['UPDATE_GOLDEN'] === '1') writeFileSync(path, content);
  expect(content).toBe(readFileSync(path, 'utf8'));
}

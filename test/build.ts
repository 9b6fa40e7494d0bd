import { buildIfStale } from '../scripts/build.mjs';

/** Before the tests that start a program: `dist/` is what the sources say. */
export default async function setup(): Promise<void> {
  await buildIfStale();
}

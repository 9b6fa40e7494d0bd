/** The form in which names are compared: Unicode's NFKC, in which a subscript digit is the digit. */
export function canonical(word: string): string {
  // eslint-disable-next-line no-control-regex
  return /^[\x00-\x7f]*$/.test(word) ? word : word.normalize('NFKC');
}

/** The candidate that `word` was most likely meant to be, or null where none is near. */
export function nearest(word: string, candidates: Iterable<string>): string | null {
  let best: string | null = null;
  let bestDistance = allowedDistance(word) + 1;
  for (const candidate of candidates) {
    if (candidate === word) continue;
    const distance = candidate.toLowerCase() === word.toLowerCase() ? 0.5 : editDistance(word, candidate, Math.ceil(bestDistance) + 1);
    const nearer = distance === bestDistance && best !== null && letterDistance(word, candidate) < letterDistance(word, best);
    if (distance < bestDistance || nearer) [best, bestDistance] = [candidate, distance];
  }
  return best;
}

/** Settles ties: `c3` is nearer to `c1` than to `c0`. */
function letterDistance(a: string, b: string): number {
  let sum = 0;
  for (let i = 0; i < Math.min(a.length, b.length); i++) sum += Math.abs(a.charCodeAt(i) - b.charCodeAt(i));
  return sum;
}

/** "; did you mean `c1`?", or nothing. */
export function suggestion(word: string, candidates: Iterable<string>): string {
  const near = nearest(word, candidates);
  return near === null ? '' : `; did you mean \`${near}\`?`;
}

/** A word as a message shows it: never longer than a line. */
export const shown = (word: string): string => (word.length > 40 ? `${word.slice(0, 38)}…` : word);

const allowedDistance = (word: string): number => (word.length <= 1 ? 0 : word.length <= 4 ? 1 : word.length <= 8 ? 2 : 3);

/** Least number of letters to add, drop, change or swap with their neighbour; `limit` or more counts as `limit`. */
function editDistance(a: string, b: string, limit: number): number {
  if (Math.abs(a.length - b.length) >= limit || a.length > 60) return limit;
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      row[j] = Math.min(last[j] + 1, row[j - 1] + 1, last[j - 1] + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) row[j] = Math.min(row[j], beforeLast[j - 2] + 1);
    }
    [beforeLast, last] = [last, row];
  }
  return Math.min(last[b.length], limit);
}

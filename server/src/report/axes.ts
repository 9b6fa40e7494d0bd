/** Below this a number is drawn as zero: an axis around it would have no room for its ticks. */
const smallest = 1e-290;

/** The range of some values with room above and below; a constant gets a range of its own size. Never empty. */
export function padded(values: readonly number[]): [number, number] {
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const size = Math.max(Math.abs(low), Math.abs(high));
  const room = size < smallest ? 1 : Math.max(0.06 * (high - low), 1e-3 * size);
  return [low - room, high + room];
}

/** At most nine round values on a logarithmic axis: 1, 2, 5 times powers of ten, or the powers alone. */
export function logTicks([from, to]: readonly [number, number]): number[] {
  const decades = Array.from(
    { length: Math.floor(Math.log10(to)) - Math.floor(Math.log10(from)) + 1 },
    (_, n) => Math.floor(Math.log10(from)) + n,
  );
  const within = (steps: readonly number[]): number[] =>
    decades
      .flatMap(decade => steps.map(step => Number(`${step}e${decade}`)))
      .filter(value => value >= from * (1 - 1e-9) && value <= to * (1 + 1e-9));
  const fine = within([1, 2, 5]);
  if (fine.length < 2) return [from, to];
  if (fine.length <= 9) return fine;
  const coarse = within([1]);
  const stride = Math.ceil(coarse.length / 9);
  return coarse.filter((_, index) => index % stride === 0);
}

/** A tick in few characters. */
export function tickLabel(value: number): string {
  const size = Math.abs(value);
  const plain = Number(value.toPrecision(4));
  const label = size !== 0 && (size < 1e-3 || size >= 1e5) ? plain.toExponential().replace('e+', 'e') : String(plain);
  return label.replace(/^-/, '−');
}

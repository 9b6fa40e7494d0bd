/**
 * Polynomials in L, 1/L and ln L with complex coefficients: Σ c L^power (ln L)^log, powers within [lowest, highest], what falls below
 * `lowest` is dropped. A coefficient is called zero where it is below 1e-11 of the sum of the moduli that made it, so that terms which
 * cancel exactly vanish exactly.
 */
export interface Laurent {
  /** Slots (see `LaurentRing.slot`) of the non-zero coefficients. */
  readonly slots: Int32Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export interface LaurentTerm {
  readonly power: number;
  readonly log: number;
  readonly re: number;
  readonly im: number;
}

const RELATIVE_ZERO = 1e-11;

export class LaurentRing {
  readonly zero: Laurent = { slots: new Int32Array(0), re: new Float64Array(0), im: new Float64Array(0) };
  private readonly re: Float64Array;
  private readonly im: Float64Array;
  private readonly size: Float64Array;
  private readonly width: number;
  /** The slots touched since `clear`: from `first` up to and without `end`. */
  private first = 0;
  private end = 0;

  /** Powers lowest..highest in steps of one, logs 0..highestLog. */
  constructor(
    readonly lowest: number,
    readonly highest: number,
    readonly highestLog: number,
  ) {
    this.width = highestLog + 1;
    const count = (highest - lowest + 1) * this.width;
    this.re = new Float64Array(count);
    this.im = new Float64Array(count);
    this.size = new Float64Array(count);
  }

  /** Starts a sum; then `add`/`addProduct`; then `take`. One sum at a time. */
  clear(): void {
    this.re.fill(0, this.first, this.end);
    this.im.fill(0, this.first, this.end);
    this.size.fill(0, this.first, this.end);
    this.first = this.re.length;
    this.end = 0;
  }

  private touch(slot: number): void {
    if (slot < this.first) this.first = slot;
    if (slot >= this.end) this.end = slot + 1;
  }

  add(power: number, log: number, re: number, im: number): void {
    if (power < this.lowest) return;
    if (power > this.highest || log > this.highestLog) throw new RangeError('a Laurent polynomial has outgrown its ring');
    const slot = (power - this.lowest) * this.width + log;
    this.touch(slot);
    this.re[slot] += re;
    this.im[slot] += im;
    this.size[slot] += Math.abs(re) + Math.abs(im);
  }

  addScaled(x: Laurent, re: number, im: number): void {
    for (let s = 0; s < x.slots.length; s++) {
      const slot = x.slots[s];
      this.touch(slot);
      const a = x.re[s] * re - x.im[s] * im;
      const b = x.re[s] * im + x.im[s] * re;
      this.re[slot] += a;
      this.im[slot] += b;
      this.size[slot] += Math.abs(a) + Math.abs(b);
    }
  }

  addProduct(x: Laurent, y: Laurent): void {
    const { width, lowest } = this;
    for (let s = 0; s < x.slots.length; s++) {
      const xPower = Math.floor(x.slots[s] / width) + lowest;
      const xLog = x.slots[s] % width;
      for (let t = 0; t < y.slots.length; t++) {
        const slot = y.slots[t] + xPower * width + xLog;
        if (slot < 0 || (xPower < 0 && Math.floor(y.slots[t] / width) + xPower < 0)) continue;
        if ((y.slots[t] % width) + xLog >= width || slot >= this.re.length)
          throw new RangeError('a Laurent polynomial has outgrown its ring');
        this.touch(slot);
        const a = x.re[s] * y.re[t] - x.im[s] * y.im[t];
        const b = x.re[s] * y.im[t] + x.im[s] * y.re[t];
        this.re[slot] += a;
        this.im[slot] += b;
        this.size[slot] += Math.abs(a) + Math.abs(b);
      }
    }
  }

  take(): Laurent {
    let count = 0;
    for (let s = this.first; s < this.end; s++) if (this.isNonZero(s)) count++;
    if (count === 0) return this.zero;
    const taken = { slots: new Int32Array(count), re: new Float64Array(count), im: new Float64Array(count) };
    for (let s = this.first, at = 0; s < this.end; s++) {
      if (!this.isNonZero(s)) continue;
      taken.slots[at] = s;
      taken.re[at] = this.re[s];
      taken.im[at] = this.im[s];
      at++;
    }
    return taken;
  }

  private isNonZero(slot: number): boolean {
    return Math.abs(this.re[slot]) + Math.abs(this.im[slot]) > RELATIVE_ZERO * this.size[slot];
  }

  terms(x: Laurent): LaurentTerm[] {
    return Array.from(x.slots, (slot, s) => ({
      power: Math.floor(slot / this.width) + this.lowest,
      log: slot % this.width,
      re: x.re[s],
      im: x.im[s],
    }));
  }

  of(terms: readonly LaurentTerm[]): Laurent {
    this.clear();
    for (const t of terms) this.add(t.power, t.log, t.re, t.im);
    return this.take();
  }

  /** The terms that grow with L once logarithms are written as ln(L/scale): power > 0, or power 0 and a logarithm. */
  growing(x: Laurent, scale: number): Laurent {
    const shift = Math.log(scale);
    const reexpanded = shift === 0 ? this.terms(x) : shiftLogs(this.terms(x), shift);
    const kept = reexpanded.filter(t => t.power > 0 || (t.power === 0 && t.log > 0));
    return this.of(shift === 0 ? kept : shiftLogs(kept, -shift));
  }
}

/** (ln L)^b = (ln(L/X) + ln X)^b written out: the terms in ln(L/X), `shift` = ln X. */
export function shiftLogs(terms: readonly LaurentTerm[], shift: number): LaurentTerm[] {
  return terms.flatMap(t => {
    let binomial = 1;
    return Array.from({ length: t.log + 1 }, (_, j) => {
      const factor = binomial * shift ** j;
      binomial *= (t.log - j) / (j + 1);
      return { power: t.power, log: t.log - j, re: t.re * factor, im: t.im * factor };
    });
  });
}

/** Does (power, log) grow faster than (power2, log2)? */
export const growsFaster = (power: number, log: number, power2: number, log2: number): boolean =>
  power > power2 || (power === power2 && log > log2);

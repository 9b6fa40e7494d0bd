import { gaussLegendre } from '../quadrature/gauss-legendre';
import { legendreP } from '../special/legendre-p';
import { besselJ } from '../special/bessel-j';
import { sphericalBessels } from '../special/spherical-bessel';

const POINTS = 20;
const RULE = gaussLegendre(POINTS);
/** Legendre coefficients from values at the nodes: [degree][node]. */
const ANALYSIS = Array.from({ length: POINTS }, (_, n) =>
  Float64Array.from(RULE.nodes, (x, j) => (n + 0.5) * RULE.weights[j] * legendreP(n, x)),
);

interface Panel {
  readonly middle: number;
  readonly half: number;
  readonly coefficients: Float64Array;
}

/** A function of r as Legendre series on panels: its Fourier integrals cost the same at any frequency (Bakhvalov and Vasil'eva, 1968). */
export class Panels {
  private readonly panels: Panel[] = [];
  /** ∫|f|, roughly. */
  readonly size: number;
  private readonly bessels = new Float64Array(POINTS);

  /** `breaks`: rising; bisected between them until the series converges, or the panel no longer counts. */
  constructor(
    private readonly f: (r: Float64Array, out: Float64Array) => void,
    breaks: readonly number[],
  ) {
    const total = breaks.slice(1).reduce((sum, to, j) => sum + area(this.expand(breaks[j], to)), 0);
    for (let j = 1; j < breaks.length; j++) this.refine(breaks[j - 1], breaks[j], 1e-18 * total, 0);
    this.size = this.panels.reduce((sum, panel) => sum + area(panel), 0);
  }

  /** ∫f(r) cos(qr) dr and ∫f(r) sin(qr) dr. */
  fourier(q: number): { cosine: number; sine: number } {
    let cosine = 0;
    let sine = 0;
    for (const { middle, half, coefficients } of this.panels) {
      sphericalBessels(POINTS - 1, q * half, this.bessels);
      // ∫P_n(t) exp(iωt) dt = 2 i^n j_n(ω).
      let re = 0;
      let im = 0;
      for (let n = 0; n < POINTS; n += 4) {
        re += coefficients[n] * this.bessels[n] - coefficients[n + 2] * this.bessels[n + 2];
        im += coefficients[n + 1] * this.bessels[n + 1] - coefficients[n + 3] * this.bessels[n + 3];
      }
      const c = 2 * half * Math.cos(q * middle);
      const s = 2 * half * Math.sin(q * middle);
      cosine += c * re - s * im;
      sine += s * re + c * im;
    }
    return { cosine, sine };
  }

  /** ∫f(r) J_0(qr) dr. */
  hankel(q: number): number {
    const { r, w } = this.rule(q);
    return r.reduce((sum, x, j) => sum + w[j] * besselJ(0, q * x), 0);
  }

  /** Points r and weights times f(r) that integrate f against anything that oscillates no faster than exp(iqr). */
  rule(q: number): { readonly r: Float64Array; readonly w: Float64Array } {
    const r: number[] = [];
    const w: number[] = [];
    for (const { middle, half, coefficients } of this.panels) {
      const parts = Math.max(1, Math.ceil((q * half) / 10));
      for (let part = 0; part < parts; part++) {
        for (let j = 0; j < POINTS; j++) {
          const t = -1 + (2 * part + 1 + RULE.nodes[j]) / parts;
          r.push(middle + half * t);
          w.push((RULE.weights[j] * half * legendreSum(coefficients, t)) / parts);
        }
      }
    }
    return { r: Float64Array.from(r), w: Float64Array.from(w) };
  }

  private refine(from: number, to: number, negligible: number, depth: number): void {
    const panel = this.expand(from, to);
    const c = panel.coefficients;
    const last = Math.max(Math.abs(c[POINTS - 1]), Math.abs(c[POINTS - 2]), Math.abs(c[POINTS - 3]));
    const peak = c.reduce((max, x) => Math.max(max, Math.abs(x)), 0);
    if (depth >= 100 || last <= 2e-15 * peak || last * panel.half <= negligible) {
      if (peak > 0) this.panels.push(panel);
      return;
    }
    const middle = (from + to) / 2;
    this.refine(from, middle, negligible, depth + 1);
    this.refine(middle, to, negligible, depth + 1);
  }

  private expand(from: number, to: number): Panel {
    const middle = (from + to) / 2;
    const half = (to - from) / 2;
    const values = new Float64Array(POINTS);
    this.f(
      RULE.nodes.map(x => middle + half * x),
      values,
    );
    const coefficients = Float64Array.from(ANALYSIS, row => row.reduce((sum, w, j) => sum + w * values[j], 0));
    return { middle, half, coefficients };
  }
}

function area({ half, coefficients }: Panel): number {
  return 2 * half * coefficients.reduce((max, x) => Math.max(max, Math.abs(x)), 0);
}

/** Σ c_n P_n(t). */
function legendreSum(c: Float64Array, t: number): number {
  let above = 0;
  let value = 0;
  for (let n = c.length - 1; n >= 0; n--)
    [above, value] = [value, c[n] + ((2 * n + 1) / (n + 1)) * t * value - ((n + 1) / (n + 2)) * above];
  return value;
}

import { formatDimension, near, product, sameDimension, type Dimension, type UnitSystem } from './units';

/**
 * The dimensions of one model. A free coupling takes the dimension that its kernel asks for: it is unknown until an equation settles it.
 * In natural units everything is a pure number and everything agrees.
 */
export class Dimensions {
  private readonly settled = new Map<string, Dimension>();

  constructor(private readonly system: UnitSystem | null) {}

  /** The dimension of the free coupling `name`. */
  free(name: string): Dimension {
    return this.settled.get(name) ?? { e: 0, l: 0, free: new Map([[name, 1]]) };
  }

  /** Do both have the same dimension? Settles an unknown one if that makes them agree. */
  agree(a: Dimension, b: Dimension): boolean {
    if (this.system === null) return true;
    const difference = this.resolved(product(a, b, -1));
    const unknown = difference.free?.entries().next().value;
    if (unknown === undefined) return sameDimension(difference, { e: 0, l: 0 });
    const [name, exponent] = unknown;
    const others = product(difference, { e: 0, l: 0, free: new Map([[name, exponent]]) }, -1);
    this.settled.set(name, product({ e: 0, l: 0 }, others, -1 / exponent));
    return true;
  }

  /** With every coupling settled so far put in. */
  resolved(dimension: Dimension): Dimension {
    let result = dimension;
    for (let again = true; again && result.free !== undefined;) {
      again = false;
      for (const [name, exponent] of result.free) {
        const known = this.settled.get(name);
        if (known === undefined) continue;
        result = product(product(result, { e: 0, l: 0, free: new Map([[name, exponent]]) }, -1), known, exponent);
        again = true;
        break;
      }
    }
    return result;
  }

  /** "a pure number", "MeV*fm^3". */
  name(dimension: Dimension): string {
    const { e, l } = this.resolved(dimension);
    return near(e, 0) && near(l, 0) ? 'a pure number' : `\`${this.format({ e, l })}\``;
  }

  /** "1", "MeV*fm^3", as the report gives it. */
  format(dimension: Dimension): string {
    return this.system === null ? '1' : formatDimension(this.resolved(dimension), this.system);
  }
}

import { compile } from '../../core/algebra/compile';
import { number, substitute, type Complex, type Expr } from '../../core/algebra/expression';
import type { CountertermSpec, ModelSpec } from '../../core/model/spec';
import { evaluate, independent, modulus, readForm } from './forms';

/**
 * Whether conditions on the on-shell amplitude (p = k, E the kinetic energy) near the momentum `at` can fix the strengths
 * of counterterms of these forms: within each block the on-shell forms must be linearly independent. In dimension 1 with
 * wave full the blocks are even–even, odd–odd and mixed, and a form must lie in one of them. `null` stands for a form that
 * is no expression in p, k, E; it can only be set alone.
 */
export function fixedOnShell(forms: readonly (Expr | null)[], spec: ModelSpec, at: number): boolean {
  const momenta = forms.map((_, index) => at * (1 + 0.37 * index));
  const blocks = new Map<string, Complex[][]>();
  for (const form of forms) {
    if (!form) return forms.length === 1;
    const parts = onShellParts(form, spec, momenta).filter(({ values }) => values.some(z => modulus(z) > 1e-12));
    if (parts.length !== 1) return false;
    const [{ block, values }] = parts as [Part];
    blocks.set(block, [...(blocks.get(block) ?? []), values]);
  }
  return [...blocks.values()].every(independent);
}

interface Part {
  readonly block: string;
  readonly values: Complex[];
}

function onShellParts(expr: Expr, spec: ModelSpec, momenta: readonly number[]): Part[] {
  const energies = kineticEnergies(spec, momenta);
  const at = (signOut: number, signIn: number): Complex[] =>
    evaluate(
      expr,
      momenta.map((p, index) => ({ p: signOut * p, k: signIn * p, E: energies[index] })),
    );
  if (spec.wave.kind !== 'full') return [{ block: 'one', values: at(1, 1) }];
  const [pp, pm, mp, mm] = [at(1, 1), at(1, -1), at(-1, 1), at(-1, -1)];
  const part = (block: string, a: number, b: number): Part => ({
    block,
    values: pp.map((z, i) => ({
      re: (z.re + b * pm[i].re + a * mp[i].re + a * b * mm[i].re) / 4,
      im: (z.im + b * pm[i].im + a * mp[i].im + a * b * mm[i].im) / 4,
    })),
  });
  return [part('even', 1, 1), part('odd', -1, -1), part('mixed', 1, -1)];
}

function kineticEnergies(spec: ModelSpec, momenta: readonly number[]): number[] {
  if (!spec.kinetic) return momenta.map(p => (p * p) / (2 * spec.mu));
  const [re, im] = [new Float64Array(momenta.length), new Float64Array(momenta.length)];
  compile(withCouplings(spec.kinetic, spec))({ k: Float64Array.from(momenta) }, re, im);
  return [...re];
}

/** A form of the results (`p^2+k^2`, `of NAME`) as an expression in p, k, E; null where it is none. */
export const expressionOf = (form: string, spec: ModelSpec): Expr | null =>
  form.startsWith('of ') ? kernelOf(form.slice(3), spec) : readForm(form);

/** The form of a counterterm that a model declares. */
export const declaredForm = ({ form }: CountertermSpec, spec: ModelSpec): Expr | null =>
  'of' in form ? kernelOf(form.of, spec) : withCouplings(form.expr, spec);

function kernelOf(name: string, spec: ModelSpec): Expr | null {
  const found = spec.interactions.find(interaction => interaction.name === name);
  return found && (found.arguments === 'pk' || found.arguments === 'pkE') ? withCouplings(found.kernel, spec) : null;
}

const withCouplings = (expr: Expr, spec: ModelSpec): Expr =>
  substitute(expr, new Map(spec.couplings.map(({ name, value }) => [name, number(value)])));

import { countertermsFor, divergences, type Divergence } from '../divergence';
import type { QuickFix } from '../finding';
import type { Evaluated } from '../rule';
import { listed } from '../words/numbers';
import { insertion } from './insert';
import { needOf, needsOf, type Need, type NeededForm } from './needed';
import { declaredForm, expressionOf, fixedOnShell } from './on-shell';
import { schemeOf, schemesFor, type Scheme } from './scheme';

/**
 * The quick fixes for a divergence that is not cancelled: counterterms of the forms it lacks, set on shell (where that
 * determines them) or minimally; the same with declared couplings absorbing what they can; and all counterterms of the model.
 */
export function fixesFor(model: Evaluated, divergence: Divergence): QuickFix[] {
  const needs = needsOf(model, divergence);
  const added = variants(model, needs, false).map(plan => fix(model, plan, addTitle(plan, needs)));
  const absorbers = [...new Set(needs.flatMap(({ forms }) => forms.flatMap(({ absorbedBy }) => absorbedBy ?? [])))];
  const absorbed = absorbers.length === 0 ? [] : variants(model, needs, true).map(plan => fix(model, plan, absorbTitle(plan, absorbers)));
  return [...added.map((one, index) => ({ ...one, preferred: index === 0 })), ...absorbed, ...fixesForAll(model)];
}

/** Counterterms for everything that is not cancelled up to the model's order, in both schemes; none where nothing is missing. */
export function fixesForAll(model: Evaluated): readonly QuickFix[] {
  const known = all.get(model) ?? planForAll(model);
  all.set(model, known);
  return known;
}

/** Every finding of a model carries the same ones, so they are worked out once. */
const all = new WeakMap<Evaluated, readonly QuickFix[]>();

function planForAll(model: Evaluated): QuickFix[] {
  const needs = divergences(model)
    .filter(({ open }) => open)
    .map(({ term }) => needOf(model, term))
    .filter(({ forms }) => forms.length > 0);
  return variants(model, needs, false).map(plan =>
    fix(model, plan, `Add all counterterms up to order ${model.spec.series.order}, subtract ${plan.scheme}`),
  );
}

interface Statement {
  readonly name: string;
  /** `(p, k) = 1`, ` of bump`. */
  readonly form: string;
  readonly cancels: string[];
  readonly scheme: string;
}

interface Plan {
  readonly statements: readonly Statement[];
  readonly scheme: string;
}

function variants(model: Evaluated, needs: readonly Need[], absorbing: boolean): Plan[] {
  if (needs.length === 0) return [];
  const { onShell, minimal } = schemesFor(model);
  return [onShell, minimal]
    .flatMap(scheme => plan(model, needs, scheme, absorbing) ?? [])
    .filter((one, index, all) => all.findIndex(other => JSON.stringify(other.statements) === JSON.stringify(one.statements)) === index);
}

/** One statement for each form and scheme, in the order of the monomials; null where on-shell conditions cannot set the strengths. */
function plan(model: Evaluated, needs: readonly Need[], wished: Scheme, absorbing: boolean): Plan | null {
  const statements: Statement[] = [];
  const name = namesFor(model);
  for (const { term, forms } of needs) {
    const declared = countertermsFor(model, term.exponents);
    const scheme = declared[0] ? schemeOf(declared[0], model.spec) : wished;
    const together = [...declared.map(own => declaredForm(own, model.spec)), ...forms.map(({ form }) => expressionOf(form, model.spec))];
    if (scheme.onShellAt !== null && !fixedOnShell(together, model.spec, scheme.onShellAt)) return null;
    for (const form of forms.map(one => written(one, absorbing))) {
      const same = statements.find(one => one.form === form && one.scheme === scheme.words);
      if (!same) statements.push({ name: name(), form, cancels: [term.monomial], scheme: scheme.words });
      else if (!same.cancels.includes(term.monomial)) same.cancels.push(term.monomial);
    }
  }
  return { statements, scheme: statements.every(one => one.scheme === statements[0].scheme) ? statements[0].scheme : wished.words };
}

function written({ form, absorbedBy }: NeededForm, absorbing: boolean): string {
  if (absorbing && absorbedBy !== null) return ` of ${absorbedBy}`;
  if (form.startsWith('of ')) return ` ${form}`;
  return `(${/\bE\b/.test(form) ? 'p, k, E' : 'p, k'}) = ${form}`;
}

/** Names z0, z1, … that no interaction or counterterm of the model has. */
function namesFor({ spec }: Evaluated): () => string {
  const taken = new Set([...spec.interactions, ...spec.counterterms].map(({ name }) => name.normalize('NFKC')));
  let next = 0;
  return () => {
    while (taken.has(`z${next}`)) next += 1;
    return `z${next++}`;
  };
}

const fix = (model: Evaluated, { statements }: Plan, title: string): QuickFix => ({
  title,
  edits: insertion(
    model,
    statements.map(({ name, form, cancels, scheme }) => `counterterm ${name}${form} cancels ${cancels.join(', ')} subtract ${scheme}`),
  ),
  preferred: false,
});

function addTitle({ statements, scheme }: Plan, needs: readonly Need[]): string {
  const monomials = listed(
    needs.map(({ term }) => term.monomial),
    4,
  );
  const [first] = statements;
  const what =
    statements.length === 1 ? `counterterm ${first.name}${first.form}` : `counterterms ${listed(statements.map(({ name }) => name))}`;
  return `Add ${what} for ${monomials}, subtract ${scheme}`;
}

function absorbTitle({ statements, scheme }: Plan, absorbers: readonly string[]): string {
  const others = statements.filter(({ form }) => !form.startsWith(' of '));
  const rest = others.length > 0 ? ` and add ${listed(others.map(({ name }) => name))} for the rest` : '';
  return `Let ${listed(absorbers.map(name => `\`${name}\``))} absorb it${rest}, subtract ${scheme}`;
}

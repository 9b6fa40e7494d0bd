import { countertermsFor, divergences, inside, type Divergence } from './divergence';
import { fixesFor } from './counterterms/fixes';
import { needOf, type NeededForm } from './counterterms/needed';
import { placeOfMonomial } from './places';
import { onResults, type Draft, type Evaluated, type FindingRule } from './rule';
import { growthFormula, growthInWords } from './words/growth';
import { listed } from './words/numbers';

/**
 * A monomial grows without limit as the cutoff is lifted, in a way that its own counterterm must take. An error where none
 * does, else information. Stands on the interaction's name, and on a counterterm that is there but does not suffice.
 */
export const uvDivergence: FindingRule = {
  code: 'uv-divergence',
  raise: onResults(model =>
    divergences(model)
      .filter(({ kind }) => kind === 'own')
      .flatMap(found => [onInteraction(model, found), ...onCounterterms(model, found)]),
  ),
};

function onInteraction(model: Evaluated, found: Divergence): Draft {
  const { term, open } = found;
  return {
    severity: open ? 'error' : 'information',
    message: `${behaviour(model, found)}${open ? remedy(model, found) : cancelled(model, found)}.`,
    span: placeOfMonomial(model, term.exponents),
    subject: term.monomial,
    related: [...inside(model, found), ...partners(model, found), ...(open ? whereToAdd(model, found) : [])],
    fixes: open ? fixesFor(model, found) : [],
  };
}

function behaviour({ spec }: Evaluated, { term: { monomial, ultraviolet } }: Divergence): string {
  const { name } = spec.cutoff;
  if (ultraviolet.verdict === 'diverges') return `${monomial} diverges ${growthInWords(ultraviolet, name)}, when ${name} is lifted`;
  const formula = growthFormula(ultraviolet, name);
  return `${monomial} oscillates without a limit${formula ? `, growing as ${formula},` : ''} when ${name} is lifted`;
}

function cancelled({ results }: Evaluated, { term, declared }: Divergence): string {
  const names = term.cancelledBy.length > 0 ? term.cancelledBy : declared.map(({ name }) => name);
  const known = results.counterterms.length > 0 || term.status === 'cancelled';
  return `; ${listed(names.map(name => `\`${name}\``))} ${known ? (names.length === 1 ? 'cancels' : 'cancel') : 'should cancel'} it`;
}

function remedy(model: Evaluated, { term }: Divergence): string {
  if (term.ultraviolet.verdict === 'oscillates') return '; a smooth cutoff (gaussian or pole) averages the oscillation out';
  const { forms } = needOf(model, term);
  if (forms.length === 0) return '';
  const absorbed = forms.filter(({ absorbedBy }) => absorbedBy !== null);
  const rest = forms.filter(({ absorbedBy }) => absorbedBy === null);
  const names = listed([...new Set(absorbed.map(({ absorbedBy }) => `\`${absorbedBy}\``))]);
  const many = new Set(absorbed.map(({ absorbedBy }) => absorbedBy)).size > 1;
  const absorb =
    absorbed.length === 0
      ? ''
      : `; ${many ? 'the couplings' : 'the coupling'} of ${names} can absorb ${rest.length > 0 ? formsInWords(absorbed) : 'it'}`;
  if (rest.length === 0) return absorb;
  return `${absorb}; ${rest.length === 1 ? 'a new counterterm' : 'new counterterms'} of ${formsInWords(rest)} ${rest.length === 1 ? 'is' : 'are'} needed`;
}

const formsInWords = (forms: readonly NeededForm[]): string =>
  `the ${forms.length === 1 ? 'form' : 'forms'} ${listed(
    forms.map(({ form }) => form),
    4,
  )}`;

/** The other interactions of the monomial, and those whose couplings can absorb it. */
function partners({ source, spec }: Evaluated, { term }: Divergence): NonNullable<Draft['related']> {
  const present = term.exponents.flatMap((exponent, index) => (exponent > 0 ? [index] : []));
  const others = present.slice(0, -1).map(index => ({
    span: source.places.interactions[index].name,
    message: `\`${spec.interactions[index].name}\` takes part in ${term.monomial}`,
  }));
  const absorbers = spec.interactions.flatMap(({ name }, index) => {
    const forms = term.ultraviolet.overall.filter(({ absorbedBy }) => absorbedBy === name).map(({ form }) => form);
    return forms.length > 0
      ? [
          {
            span: source.places.interactions[index].name,
            message: `\`${name}\` has the form ${listed([...new Set(forms)])} and can absorb it`,
          },
        ]
      : [];
  });
  return [...others, ...absorbers];
}

function whereToAdd(model: Evaluated, { term, declared }: Divergence): NonNullable<Draft['related']> {
  const at = model.source.places.insertAt;
  return declared.length === 0 ? [{ span: { start: at, end: at }, message: `a counterterm for ${term.monomial} can stand here` }] : [];
}

/** Where counterterms for the monomial are there but leave something: the finding on the last of them. */
function onCounterterms(model: Evaluated, found: Divergence): Draft[] {
  const last = countertermsFor(model, found.term.exponents).at(-1);
  const { forms } = needOf(model, found.term);
  if (!found.open || !last || forms.length === 0) return [];
  return [
    {
      severity: 'error',
      message: `\`${last.name}\` does not cancel all of ${found.term.monomial}: ${formsInWords(forms)} ${forms.length === 1 ? 'stays' : 'stay'}.`,
      span: model.source.places.counterterms[model.spec.counterterms.indexOf(last)].name,
      subject: last.name,
      related: [
        { span: placeOfMonomial(model, found.term.exponents), message: `${found.term.monomial} diverges through this interaction` },
      ],
      fixes: fixesFor(model, found),
    },
  ];
}

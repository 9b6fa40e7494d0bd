import { describe, expect, test } from 'vitest';
import { findingsOf } from '../../server/src/findings';
import { annotated } from '../support/annotated';
import { checkedWire, diverges, grows, termOf } from '../support/wire';

const marked = (document: ReturnType<typeof checkedWire>): string => annotated(document.document.text, findingsOf(document));

describe('where findings stand', () => {
  test('an uncancelled divergence, what it is nested in, and the expectation that fails', () => {
    expect(marked(checkedWire({ cancelled: false }))).toBe(`\
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ error uv-divergence twist^2
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ information uv-nested bump*twist^2
  expect finite
  ^^^^^^^^^^^^^ error expectation finite`);
  });

  test('a cancelled one is information', () => {
    expect(marked(checkedWire())).toBe(`\
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ information uv-divergence twist^2
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ information uv-nested bump*twist^2
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ information cutoff-dependence twist^2`);
  });

  test('a counterterm that is not enough is marked too', () => {
    const document = checkedWire({
      results: results => ({
        ...results,
        expectations: [],
        terms: [termOf('twist^2', [0, 2], { ultraviolet: diverges([grows('1', 'bump'), grows('p^2+k^2')]), status: 'uncancelled' })],
      }),
    });
    expect(marked(document)).toBe(`\
  interaction twist(p, k) = i*c1*(p - k)
              ^^^^^ error uv-divergence twist^2
  counterterm z0(p, k) = 1 cancels twist^2 subtract at p = 0.1
              ^^ error uv-divergence z0`);
    const messages = findingsOf(document).map(({ message }) => message);
    expect(messages[0]).toContain('the form p^2+k^2 is needed');
    expect(messages[1]).toBe('`z0` does not cancel all of twist^2: the form p^2+k^2 stays.');
  });

  test('a series that diverges is told once, on the word', () => {
    const document = checkedWire({
      results: results => ({
        ...results,
        terms: [],
        sum: [],
        series: [0.05, 0.1, 0.2, 0.3, 0.4, 0.5].map(p => ({
          p,
          E: (p * p) / 2,
          largestEigenvalue: { re: 0, im: -0.2 / p },
          converges: p > 0.3,
          eigenvalues: [],
        })),
      }),
    });
    expect(marked(document)).toBe(`\
  series to 3 at p = 0.05 .. 1.0 (12 points)
  ^^^^^^ information series-diverges series`);
    expect(findingsOf(document)[0].message).toBe(
      'The series does not converge at p = 0.05, p = 0.1, p = 0.2 and p = 0.3: the largest eigenvalue of G₀V has modulus 4 at p = 0.05, and it must be below 1. More orders do not improve the sum there.',
    );
  });
});

describe('what an ultraviolet finding says', () => {
  const messageOf = (overall: ReturnType<typeof grows>[]): string => {
    const terms = [termOf('twist^2', [0, 2], { ultraviolet: diverges(overall), status: 'uncancelled' })];
    return findingsOf(checkedWire({ cancelled: false, results: results => ({ ...results, terms, expectations: [] }) }))[0].message;
  };

  test.each([
    [[grows('1', 'bump')], 'twist^2 diverges linearly, as L^1, when L is lifted; the coupling of `bump` can absorb it.'],
    [
      [grows('p^2+k^2', null, 0, 1)],
      'twist^2 diverges logarithmically, as ln L, when L is lifted; a new counterterm of the form p^2+k^2 is needed.',
    ],
    [
      [grows('1', 'bump', 3), grows('1', 'bump', 1)],
      'twist^2 diverges cubically, as L^3, when L is lifted; the coupling of `bump` can absorb it.',
    ],
    [
      [grows('1', 'bump', 3), grows('p^2+k^2'), grows('E')],
      'twist^2 diverges cubically, as L^3, when L is lifted; the coupling of `bump` can absorb the form 1; new counterterms of the forms p^2+k^2 and E are needed.',
    ],
  ])('%#', (overall, wanted) => expect(messageOf(overall)).toBe(wanted));

  test('related places name the other interactions, what can absorb it, what is inside and where a counterterm can stand', () => {
    const document = checkedWire({
      cancelled: false,
      results: results => ({
        ...results,
        terms: [
          ...results.terms.slice(0, 5),
          termOf('bump*twist^2', [1, 2], { ultraviolet: diverges([grows('1', 'bump', 2)], ['twist^2']), status: 'uncancelled' }),
        ],
      }),
    });
    const found = findingsOf(document).find(({ subject }) => subject === 'bump*twist^2')!;
    expect(found.related.map(({ message }) => message)).toEqual([
      'the loops of twist^2 inside bump*twist^2 diverge by themselves, as L^1',
      '`bump` takes part in bump*twist^2',
      '`bump` has the form 1 and can absorb it',
      'a counterterm for bump*twist^2 can stand here',
    ]);
    const at = found.related.map(({ span }) => document.document.text.slice(span.start, span.end));
    expect(at).toEqual(['twist', 'bump', 'bump', '']);
    expect(document.document.text.slice(found.related[3].span.start)).toBe('}\n');
  });
});

describe('before the numbers are there', () => {
  const symbolic = (cancelled: boolean): ReturnType<typeof checkedWire> =>
    checkedWire({
      cancelled,
      stage: 'symbolic',
      results: results => ({
        ...results,
        sum: [],
        series: [],
        counterterms: [],
        expectations: [],
        terms: results.terms.map(term => ({
          ...term,
          values: [],
          ultraviolet: { ...term.ultraviolet, overall: [] },
          status: term.ultraviolet.verdict === 'diverges' ? null : term.status,
        })),
      }),
    });

  test('an error shows at once, and nothing is called undecided', () => {
    expect(findingsOf(symbolic(false)).map(({ code, severity }) => `${severity} ${code}`)).toEqual([
      'error uv-divergence',
      'information uv-nested',
    ]);
  });

  test('a file with its counterterms stays quiet', () => {
    expect(findingsOf(symbolic(true)).filter(({ severity }) => severity === 'error')).toEqual([]);
  });
});

test('a counterterm whose inner divergence has none leaves something non-local', () => {
  const document = checkedWire({
    spec: spec => ({ ...spec, counterterms: spec.counterterms.map(one => ({ ...one, cancels: [[1, 2]] })) }),
    results: results => ({
      ...results,
      expectations: [],
      terms: [
        { ...results.terms[4], status: 'uncancelled' },
        termOf('bump*twist^2', [1, 2], { ultraviolet: diverges([grows('1', 'bump', 2)], ['twist^2']), status: 'uncancelled' }),
      ],
    }),
  });
  const found = findingsOf(document).find(({ code }) => code === 'nonlocal-divergence');
  expect(found).toMatchObject({ severity: 'error', subject: 'bump*twist^2' });
  expect(found!.message).toContain('cancel twist^2 first');
});

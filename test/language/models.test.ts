import { describe, expect, test } from 'vitest';
import { check, everyProblem, read, sound } from './carets';

/** Whole models as a person would write them; what this version doesn't evaluate says so at its place. */
describe('whole models', () => {
  test('two nucleons: order 0, fix, data, observables', () => {
    const document = check(`const hbarc = 197.3269804 MeV*fm
const mx = 140 MeV/hbarc
model pair {
  units MeV, fm
  wave l = 0
  mass 938.272 MeV, 939.565 MeV
  const gx = 1.3  const fx = 93 MeV
  const strength = gx^2*(140 MeV)^2/(16*pi*fx^2)
  coupling c0 free
  coupling c2 free
  interaction contact(p, k) = c0 order 0
                                 ^^^^^^^ not-evaluated
  interaction exchange(r)   = -strength*hbarc*exp(-mx*r)/r order 0
                                                           ^^^^^^^ not-evaluated
  interaction range(p, k)   = c2*(p^2 + k^2) order 2
  cutoff Λ = 480 MeV gaussian(3) scan 240 MeV .. 960 MeV
  series to 2 at E_lab = 5 MeV, 10 MeV .. 200 MeV (8 points)
  fix c0 with scattering_length = -23.7 fm
  ^^^ not-evaluated
  fix c2 with phase_shift = 40.5 at E_lab = 100 MeV order by order
  ^^^ not-evaluated
  data pwa = "phases/1s0.csv" columns E_lab [MeV], phase_shift [deg], sigma [deg]
  ^^^^ not-evaluated
  expect converges at p = 60 MeV
  expect phase_shift = 62 within 2 % at E_lab = 1 MeV
}
model softer from pair {
                  ^^^^ not-evaluated
  cutoff Q = 300 MeV pole(2)
  expect drift < 3 % at p = 90 MeV
}`);
    expect(document.models.map(({ spec }) => spec)).toEqual([null, null]);
  });

  test('coupled channels', () => {
    check(`model coupled {
  units MeV, fm
  wave l = 0, 2
       ^^^^^^^^ not-evaluated
  mass 938.272 MeV, 939.565 MeV
  coupling m = -0.9 MeV*fm^3
  coupling l = 0.35 MeV*fm^5
  interaction core(p, k)[1, 1]   = m*exp(-(p^2 + k^2)*1 fm^2)
  interaction tensor(p, k)[1, 2] = l*k^2
  interaction tensor(p, k)[2, 2] = l*p*k order 2
                                         ^^^^^^^ value: same order
  interaction tensor(p, k)[2, 2] = l*p*k
              ^^^^^^ duplicate: tensor[2, 2]
  interaction tensor(p, k)[3, 1] = l*p^2
                           ^ value: at most 2
  interaction tail(r) = -15 MeV*exp(-r/1.4 fm)/(r*1 fm^-1)
  interaction bare(p, k) = m
              ^^^^ value: [a, b]
}`);
  });

  test('a wire in position space, two models in one file', () => {
    const spec = sound(`model stub {
  units meV, nm
  dimension 1 wave full
  mass reduced 0.07 me
  const w = 3 nm
  coupling v = 40 meV
  coupling s = 15 meV*nm
  coupling t = 2 meV*nm^2
  interaction well(x)  = -v*exp(-x^2/(2*w^2))
  interaction spike(x) = s*delta(x - 4 nm)
  interaction tilt(x)  = t*delta'(x)
  interaction box(x)   = v/10*step(w/2 - abs(x)) order 2
  cutoff L = 3 nm^-1 pole(2) scan 0.5 nm^-1 .. 30 nm^-1
  series to 3 at E = 5 meV, 10 meV .. 50 meV (9 points)
  counterterm z(p, k) = 1 cancels tilt^2 subtract at p = 0.1 nm^-1
  counterterm y of spike cancels tilt^3 subtract at kappa = 0.2 nm^-1
  expect   transmission = 0.4   # at resonance
    within 10 % at p = 0.1 nm^-1
}`);
    expect(spec.interactions.map(({ order }) => order)).toEqual([1, 1, 1, 2]);
    expect(spec.counterterms.map(({ form, scheme }) => [form, scheme.kind])).toMatchObject([
      [{ arguments: 'pk' }, 'p'],
      [{ of: 'spike' }, 'kappa'],
    ]);
    expect(spec.couplings.map(({ dimension }) => dimension)).toEqual(['meV', 'meV*nm', 'meV*nm^2']);
    expect(spec.series.points).toHaveLength(10);
    expect(spec.expectations[0]).toMatchObject({ observable: 'transmission', value: 0.4, tolerance: expect.closeTo(0.04, 12) as number });
  });

  test('the text of an expectation is folded', () => {
    const { places } = read('model a { mass reduced 1 interaction v(p, k) = 1 expect   finite # yes\n   to\t2 }').models[0];
    expect(places.expectations.map(({ text }) => text)).toEqual(['finite to 2']);
  });

  test('places stand where the words stand', () => {
    const text = 'model a { mass reduced 1 coupling g = 2 interaction v(p, k) = g cutoff Λ = 9 sharp series to 2 }';
    const { places } = read(text).models[0];
    const at = ({ start, end }: { start: number; end: number }) => text.slice(start, end);
    expect(at(places.name)).toBe('a');
    expect(at(places.model)).toBe(text);
    expect(text[places.insertAt]).toBe('}');
    expect(at(places.couplings[0].name)).toBe('g');
    expect(at(places.couplings[0].statement)).toBe('coupling g = 2');
    expect(at(places.interactions[0].name)).toBe('v');
    expect(at(places.cutoff!.name)).toBe('Λ');
    expect(at(places.series!.keyword)).toBe('series');
  });

  test('an unread file may hold any name', () => {
    const document = read(
      'use "more.tare"\nmodel a { mass reduced 1 interaction v(p, k) = elsewhere }\nmodel b { mass reduced 1 interaction v(p, k) = 1 }',
    );
    expect(everyProblem(document).map(({ code }) => code)).toEqual(['not-evaluated']);
    expect(document.models.map(({ spec }) => spec === null)).toEqual([true, false]);
  });
});

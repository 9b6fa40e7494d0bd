import { describe, expect, test } from 'vitest';
import { check, sound } from './carets';

const hbarc = 197.3269804;

const nuclear = (body: string) => `model a { units MeV, fm
mass 938.272 MeV, 939.565 MeV
${body} }`;

describe('in MeV and fm', () => {
  test('numbers come out in the units of the model', () => {
    const spec = sound(
      nuclear(`coupling c = 2 MeV*fm^3
      coupling d = 0.003 keV*nm^2*angstrom
      interaction v(p, k) = c + d
      cutoff L = 450 MeV gaussian(2) scan 1 fm^-1 .. 900 MeV
      series to 2 at p = 100 MeV, 1 fm^-1 .. 200 keV/hbarc*1000*2
      expect amplitude = 3 MeV*fm^3 within 5 % at p = 1 fm^-1`),
    );
    expect(spec.units).toEqual({ energy: 'MeV', length: 'fm' });
    expect(spec.mu).toBeCloseTo((938.272 * 939.565) / (938.272 + 939.565) / hbarc ** 2, 10);
    expect(spec.masses).toEqual([938.272, 939.565]);
    expect(spec.couplings[0]).toEqual({ name: 'c', value: 2, dimension: 'MeV*fm^3' });
    expect(spec.couplings[1].value).toBeCloseTo(0.003e-3 * 1e12 * 1e5, 0);
    expect(spec.cutoff.value).toBeCloseTo(450 / hbarc, 8);
    expect(spec.cutoff.scan!.to).toBeCloseTo(900 / hbarc, 8);
    expect(spec.series.points[0].p).toBeCloseTo(100 / hbarc, 8);
    expect(spec.series.points.at(-1)!.p).toBeCloseTo(400 / hbarc, 8);
    expect(spec.expectations[0]).toMatchObject({ kind: 'observable', value: 3, tolerance: 0.15, point: { p: 1, E: null } });
  });

  test('E and E_lab', () => {
    const spec = sound(nuclear('interaction v(p, k) = 1 MeV*fm^3 series to 1 at E_lab = 50 MeV'));
    // p^2 = B^2 T (T + 2A)/((A + B)^2 + 2 B T): A hits B at rest (Stoks et al., Phys. Rev. C 48 (1993) 792).
    const [A, B, T] = [938.272, 939.565, 50];
    const pc = Math.sqrt((B * B * T * (T + 2 * A)) / ((A + B) ** 2 + 2 * B * T));
    expect(spec.series.points[0].E).toBeNull();
    expect(spec.series.points[0].p).toBeCloseTo(pc / hbarc, 8);
    const energies = sound(nuclear('interaction v(p, k) = 1 MeV*fm^3 series to 1 at E = -2 MeV, 3 MeV')).series.points;
    expect(energies.map(({ E }) => E)).toEqual([-2, 3]);
    expect(energies[0].p).toBeNull();
    expect(energies[1].p).toBeCloseTo(Math.sqrt((6 * A * B) / (A + B)) / hbarc, 8);
  });

  test('an energy is inverted through a kinetic energy of its own', () => {
    const spec = sound('model a { dimension 1 kinetic(k) = 3*abs(k) interaction v(p, k) = 1 series to 1 at E = 6 }');
    expect(spec.series.points[0].E).toBe(6);
    expect(spec.series.points[0].p).toBeCloseTo(2, 10);
  });

  test.each([
    ['interaction v(p, k) = 3\n                      ^ dimension: ⟨p|V|k⟩ has the dimension `MeV*fm^3`, and this is a pure number'],
    ['interaction v(r) = 3 MeV*fm\n                   ^^^^^^^^ dimension: V(r)'],
    ['interaction v(r) = 3 MeV*exp(-r)\n                             ^^ dimension: argument of `exp`'],
    ['interaction v(r) = 3 MeV*exp(-r/2 fm) + 2 fm\n                                        ^^^^ dimension: cannot be added'],
    ['interaction v(r) = 0', ''],
    ['interaction v(r) = 3 MeV*delta(r)\n                   ^^^^^^^^^^^^^^ dimension: `MeV`, and this is `MeV*fm^-3`'],
    ['interaction v(r) = 3 MeV*fm^3*delta(r)', ''],
    ['interaction v(p, k) = 3 MeV*fm^3*p^k\n                                   ^ dimension: exponent'],
    ['interaction v(p, k) = 2 mev\n                        ^^^ syntax: `MeV` or `meV`'],
    ['interaction v(p, k) = 2 MeV^1.5\n                            ^^^ syntax: (3 MeV)^n'],
    ['coupling K = 2 interaction v(r) = 3 MeV*K/(1 K)\n                                        ^ reading: as the unit'],
    ['const l = 1/2 fm interaction v(r) = 1 MeV*exp(-r*l)\n          ^^^^^^ reading'],
    [
      'interaction v(r) = 0 cutoff L = 500 sharp\n                                ^^^ dimension: The cutoff is a momentum and 500 has no unit; write `500 MeV` or `500 fm^-1`',
    ],
    ['interaction v(r) = 0 cutoff L = 500 fm sharp\n                                ^^^^^^ dimension: The cutoff is a momentum'],
    ['interaction v(r) = 0 expect binding_energy = 2 fm within 1 %\n                                             ^^^^ dimension'],
    ['interaction v(r) = 0 kinetic(k) = k^2\n                                  ^^^ dimension: kinetic energy'],
    ['interaction v(r) = 0 interaction w(p, k) = 1 MeV*fm^3 counterterm z(p, k) = p*k cancels w^2 subtract minimal at 100 MeV', ''],
  ])('%s', (drawn, rest = '\n') => {
    const [body, ...marks] = drawn.split('\n');
    check(`model a { units MeV, fm mass reduced 469 MeV
${body}
${marks.join('\n')}
}${rest}`);
  });

  test('hbarc is there in models with units, and a constant of that name hides it', () => {
    expect(sound(nuclear('const m = 138 MeV/hbarc interaction v(r) = 1 MeV*exp(-m*r)')).interactions).toHaveLength(1);
    const own = sound(`const hbarc = 200 MeV*fm\nmodel a { units MeV, fm mass reduced 469 MeV interaction v(p, k) = hbarc*1 fm^2 }`);
    expect(own.interactions[0].kernel).toMatchObject({ left: { kind: 'number', re: 200 } });
    check(`model a { mass reduced 1 interaction v(p, k) = hbarc }
                                               ^^^^^ unknown-name: only in models with units`);
    check(`const w = 2 fm
model a { mass reduced 1 interaction v(p, k) = w }
                                               ^ dimension: natural units`);
  });

  test('a free coupling takes the dimension its kernel asks for, once', () => {
    check(
      nuclear(`coupling c free interaction v(p, k) = c fix c with scattering_length = 5 fm
                                        ^^^ not-evaluated
interaction w(r) = c*exp(-r/1 fm)
                   ^^^^^^^^^^^^^^ dimension: V(r)
`),
    );
  });

  test('units that cannot be, and units in the wrong order', () => {
    check(`model a { units fm, MeV mass reduced 1 MeV interaction v(p, k) = 1 }
                ^^ dimension: The first unit is one of energy`);
    check(`model a { units MeV, fn mass reduced 1 MeV interaction v(p, k) = 1 }
                     ^^ syntax: \`fn\` is no unit; did you mean \`fm\``);
  });
});

test('a wire in meV and nm: masses of the electron', () => {
  const spec = sound(`model a { units meV, nm dimension 1 mass reduced 0.067 me coupling v = 50 meV coupling s = 20 meV*nm
    interaction w(x) = -v*exp(-x^2/(2*(4 nm)^2)) + s*delta(x - 5 nm) }`);
  // hbar^2/(2 m_e) = 38.0998 meV nm^2 * 1000 (CODATA 2022)
  expect(1 / (2 * spec.mu)).toBeCloseTo((38.09982 / 0.067) * 1, 1);
  expect(spec.couplings.map(({ value }) => value)).toEqual([50, 20]);
});

test('atoms in nK and um: daltons', () => {
  const spec = sound(`model a { units nK, um dimension 2 mass 39.964 u, 39.964 u coupling g = 0.8 interaction c(p, k) = g/mu }`);
  // hbar^2/(u k_B) = 1.0545718e-34^2/(1.66053907e-27*1.380649e-23) K m^2 = 485.09 nK um^2
  expect(1 / spec.mu).toBeCloseTo((485.0873 / 39.964) * 2, 2);
});

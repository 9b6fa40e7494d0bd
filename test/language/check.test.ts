import { describe, expect, test } from 'vitest';
import { check, everyProblem, read, sound } from './carets';

const natural = (body: string) => `model a { mass reduced 1 coupling c = 2
${body}
}`;

/** A natural model in dimension 3 with one more line, problems drawn below it. */
const line = (body: string) =>
  check(
    natural(`interaction v(p, k) = c
${body}`),
  );

describe('values', () => {
  test('names', () => {
    check(`const width = 3
model a {
  mass reduced 1
  coupling c0 = 1
  coupling c1 = c3*with + wide
                ^^ unknown-name: \`c3\` is not declared; did you mean \`c1\`?
                   ^^^^ unknown-name: did you mean \`width\`?
                          ^^^^ unknown-name
  coupling pi = 3
           ^^ duplicate: predefined
  const c0 = 4
        ^^ duplicate: declared already
  cutoff L = 3 sharp
  interaction v(p, k) = c0*L
                           ^ unknown-name: is the cutoff
  interaction v(q) = c0*E
              ^ duplicate
                        ^ unknown-name: \`(p, k, E)\`
  counterterm c0(p, k) = 1 cancels v^2 subtract at p = 1
}`);
  });

  test('circles are one mistake', () => {
    check(`model a {
  mass reduced 1
  const a = b + 1
        ^ value: \`a\` depends on itself: \`a\` → \`b\` → \`a\`
  const b = 2*a
  interaction v(p, k) = a
}`);
    check(`model a {
  mass reduced 2*mu
  ^^^^ value: depends on itself
  interaction v(p, k) = 1/mu
}`);
  });

  test('a long chain of values, declared backwards, is read or refused, never a crash', () => {
    const chain = (n: number) => Array.from({ length: n }, (_, i) => `const a${n - i} = a${n - i - 1}`).join('\n');
    sound(`const a0 = 1\n${chain(150)}\nmodel m { mass reduced 1 interaction v(p, k) = a150 }`);
    const problems = everyProblem(read(`const a0 = 1\n${chain(9000)}\nmodel m { mass reduced 1 interaction v(p, k) = a9000 }`));
    expect(problems.map(({ code }) => code)).toContain('value');
  });

  test.each([
    ['const a = 1/0\n          ^^^ value: divides by zero'],
    ['const a = 0/0\n          ^^^ value: 0/0'],
    ['const a = 1e400\n          ^^^^^ value: above 1.8e308'],
    ['const a = 1e-400\n          ^^^^^^ value: below 5e-324'],
    ['const a = 1e300*1e300\n          ^^^^^^^^^^^ value: above 1.8e308'],
    ['const a = 0^-1\n          ^^^^ value: negative power of zero'],
    ['const a = log(0)\n          ^^^^^^ value: no finite value'],
    ['const a = 1/(c - 2)\n          ^^^^^^^^^ value: divides by zero'],
    ['coupling d = i\n             ^ value: real number'],
    ['coupling d free\n         ^ missing: Nothing sets the free coupling'],
    ['const a = 2 fm\n            ^^ dimension: natural units'],
    ['const a = 2 K\n            ^ dimension: natural units'],
  ])('%s', drawn => {
    line(drawn);
  });

  test('0 with exponent is 0', () => {
    expect(sound(natural('const z = 0.0e-999 interaction v(p, k) = c + z')).interactions).toHaveLength(1);
  });
});

describe('statements', () => {
  test.each([
    ['dimension 4\n          ^ value: 1, 2 or 3'],
    ['wave full\n     ^^^^ value: In dimension 3'],
    ['wave l = 1, 1\n            ^ duplicate'],
    ['wave l = 0, 2\n     ^^^^^^^^ not-evaluated'],
    ['cutoff L = 0 sharp\n           ^ value: positive'],
    ['cutoff L = -1 sharp\n           ^^ value: positive'],
    ['cutoff L = 1e400 sharp\n           ^^^^^ value: above'],
    ['cutoff L = 3 pole(0)\n             ^^^^^^^ value: exponent'],
    ['cutoff L = 3\n            ! syntax: sharp'],
    ['cutoff L = 3 sharp scan 5 .. 5\n                             ^ value: upwards'],
    ['cutoff L = 3 sharp scan 5 .. 9 (1 points)\n                                ^ value: at least 2'],
    ['series to 50\n          ^^ value: at most 12'],
    ['series to 0\n          ^ value: at least 1'],
    ['series to 2 at p = 0\n                   ^ value: positive'],
    ['series to 2 at p = 50\n                   ^^ value: beyond the sharp cutoff'],
    ['series to 2 at E_lab = 1\n                       ^ value: natural model'],
    ['series to 2 at p = 2 .. 1\n                        ^ value: upwards'],
    ['series to 2 at p = 1,5\n                   ^^^ reading: two numbers, 1 and 5'],
    ['series to 2 at p = 1 .. 2 (9999 points)\n                           ^^^^ value: at most 500'],
    ['kinetic(k) = i*k^2\n             ^^^^^ value: real'],
    ['kinetic(q) = q^2\n        ^ syntax: `k` must stand here'],
    ['propagator(k, E) = 1/(E - k)\n^^^^^^^^^^ not-evaluated'],
    [
      'data d = "a.csv" columns p, phase_shft, sigma\n^^^^ not-evaluated\n                            ^^^^^^^^^^ unknown-name: did you mean `phase_shift`',
    ],
    ['fix c with scattering_length = 2\n^^^ not-evaluated\n    ^ value: has a value already'],
    ['coupling d free fix d with effective_range = 2\n                ^^^ not-evaluated'],
    ['expect finite to 7\n                 ^ value: at most 3'],
    ['expect drift < 0 % at p = 1\n               ^ value: positive'],
    ['expect transmission = 0.5 within 1 % at p = 1\n       ^^^^^^^^^^^^ value: dimension 1'],
    ['expect binding_energy = -2 within 1 %\n                        ^^ value: positive'],
    ['expect phase_shift = 3 within 1 %\n       ^^^^^^^^^^^ syntax: at p'],
    ['expect binding_energy = 2 within 1 % at p = 1\n                                     ^^^^^^^^ syntax: one number'],
    ['expect amplitude = 0 within 5 % at p = 1\n                            ^ value: allows nothing'],
    ['mass reduced 3\n^^^^ duplicate: one `mass`'],
    ['interaction w(x) = c\n              ^ value: dimension 1'],
    ['interaction w(p, k)[1, 2] = c\n                       ^ value: at most 1'],
    ['counterterm z(p, k) = 1 cancels w^2 subtract at p = 1\n                                ^ unknown-name: no interaction'],
    ['counterterm z(p, k) = 1 cancels c^2 subtract at p = 1\n                                ^ unknown-name: is a value'],
    ['counterterm z(p, k) = 1 cancels v subtract at p = 1\n                                ^ value: no loop'],
    ['counterterm z(p, k) = 1 cancels v^4 subtract at p = 1\n                                ^^^ value: of order 4'],
    ['counterterm z(p, k) = 1 cancels v^0 subtract at p = 1\n                                  ^ value: 1 or more'],
    ['counterterm z(p, k) = 1 cancels v^2, v*v subtract at p = 1\n                                     ^^^ duplicate'],
    [
      'counterterm z(p, k) = 1 cancels v^2 subtract minimal at 0\n                                                        ^ value: positive',
    ],
    ['counterterm z of w cancels v^2 subtract at p = 1\n                 ^ unknown-name: no interaction'],
    ['counterterm v(p, k) = 1 cancels v^2 subtract at p = 1\n            ^ duplicate: declared already'],
    ['const r = 3 interaction w(r) = c*exp(-r)\n                          ^ reading: hides the value'],
  ])('%s', drawn => {
    const [body, ...marks] = drawn.split('\n');
    // In coupled channels the contact is an element.
    const contact = body.includes('l = 0, 2') ? 'interaction v(p, k)[1, 1] = c' : 'interaction v(p, k) = c';
    check(natural(`${contact}\n${body}\n${marks.join('\n')}`));
  });

  test('what is missing is said once, at the name of the model', () => {
    check(`model bare { coupling c = 1 }
      ^^^^ missing: no interaction
      ^^^^ missing: no mass`);
    check(`model bare { kinetic(k) = abs(k) interaction v(p, k) = 1/mu }
      ^^^^ missing: uses \`mu\``);
    sound('model bare { dimension 1 kinetic(k) = abs(k) interaction v(p, k) = 1 }');
    check(`model zero { mass reduced 0 interaction v(p, k) = 1/mu }
                          ^ value: A mass is positive`);
  });

  test('what the settings and the command line bring in', () => {
    const text = 'model a { mass reduced 1 interaction v(p, k) = 1 }';
    expect(sound(text)).toMatchObject({
      cutoff: { value: 30, declared: false, shape: { kind: 'sharp' } },
      series: { order: 3, declared: false, points: [{ p: 1.5, E: null }] },
    });
    const declared = 'model a { mass reduced 1 interaction v(p, k) = 1 cutoff L = 10 gaussian(2) series to 2 at p = 1 }';
    expect(sound(declared, { cutoff: 20, order: 4 })).toMatchObject({
      cutoff: { name: 'L', value: 20, declared: false, shape: { kind: 'gaussian', n: 2 } },
      series: { order: 4, declared: false },
    });
  });

  test('models: names, variants', () => {
    check(`model a { mass reduced 1 coupling c = 1 interaction v(p, k) = c }
model a { mass reduced 1 interaction v(p, k) = 1 }
      ^ duplicate: already
model b from a { coupling c = 2 expect finite }
             ^ not-evaluated
model d from aa { coupling c = 2 }
             ^^ unknown-name: did you mean \`a\`
model e from f { }
             ^ value: leads back to itself
model f from e { }
             ^ value: leads back to itself`);
  });
});

describe('kernels', () => {
  const wire = (body: string) => `model a { dimension 1 mass reduced 1 coupling c = 2
${body}
}`;

  test.each([
    ['interaction v(p, k) = c*(p - k)\n                      ^^^^^^^^^ not-hermitian: complex conjugate'],
    ['interaction v(p, k) = i*c\n                      ^^^ not-hermitian'],
    ['interaction v(q) = i*q^2\n                   ^^^^^ not-hermitian'],
    ['interaction v(x) = i*delta(x)\n                   ^^^^^^^^^^ not-hermitian'],
    ['interaction v(x) = delta(x)^2\n                   ^^^^^^^^^^ value: once in a product'],
    ['interaction v(x) = delta(2*x)\n                         ^^^ value: `x - a`'],
    ["interaction v(x) = delta'''(x)\n                   ^^^^^ value: at most two primes"],
    ['interaction v(p, k) = delta(p)\n                      ^^^^^ value: only in kernels'],
    ['interaction v(r) = c\n              ^ value: dimensions 2 and 3'],
    ['interaction v(p, k) = 1/(p - p)\n                      ^^^^^^^^^ value: no finite value'],
    ['wave even interaction v(p, k) = i*c*(p - k)\n                                ^^^^^^^^^^^ value: mixes even and odd'],
    ['wave odd interaction v(x) = c*delta(x - 1)\n                            ^^^^^^^^^^^^^^ value: mixes even and odd'],
    ["wave odd interaction v(x) = c*delta'(x)\n                            ^^^^^^^^^^^ value: mixes even and odd"],
  ])('%s', drawn => {
    check(wire(drawn));
  });

  test.each([
    'interaction v(p, k) = i*c*(p - k)',
    'interaction v(p, k, E) = c*(E + p*k)',
    'interaction v(q) = i*c*q*exp(-q^2)',
    "interaction v(x) = c*delta''(x + 2) - 3*delta'(x)/2 + x*exp(-x^2)",
    "wave even interaction v(x) = c*(delta(x - 1) + delta(x + 1)) + c*delta''(x) - x^2*exp(-x^2)",
    'wave odd interaction v(p, k) = c*p*k interaction w(q) = cos(q)',
  ])('sound: %s', body => {
    sound(wire(body));
  });
});

import { expect, test } from 'vitest';
import { check, everyProblem, read, sound } from './carets';

test('a wire with a defect is read whole', () => {
  const spec = sound(`
model notch {
  dimension 1
  mass reduced 2
  coupling g = 0.5
  coupling h = 0.25
  interaction dent(p, k) = g
  interaction tilt(p, k) = i*h*(p - k)
  cutoff L = 60 pole(2) scan 20 .. 500 (7 points)
  series to 4 at p = 0.2, 1 .. 3 (5 points)
  counterterm z(p, k) = 1 cancels tilt^2, dent*tilt*dent subtract at p = 0.2
  expect finite to 3
}`);
  expect(spec).toMatchObject({
    name: 'notch',
    dimension: 1,
    wave: { kind: 'full' },
    units: null,
    mu: 2,
    cutoff: { name: 'L', value: 60, shape: { kind: 'pole', n: 2 }, declared: true, scan: { from: 20, to: 500, points: 7 } },
    expectations: [{ kind: 'finite', to: 3 }],
  });
  expect(spec.series.points.map(({ p }) => p)).toEqual([0.2, 1, 1.5, 2, 2.5, 3]);
  expect(spec.counterterms[0].cancels).toEqual([
    [0, 2],
    [2, 1],
  ]);
  expect(spec.couplings).toEqual([
    { name: 'g', value: 0.5, dimension: '1' },
    { name: 'h', value: 0.25, dimension: '1' },
  ]);
});

test('statements need no line of their own, and comments may hold anything', () => {
  const spec = sound(
    '\uFEFFmodel a { # } " model\n mass reduced 1 coupling free = 2 coupling order = 3\u00a0interaction m(p, k) = order*free order 2\r\n}',
  );
  expect(spec.interactions).toMatchObject([{ name: 'm', order: 2 }]);
});

test('words of the grammar are free names elsewhere', () => {
  const names = [
    'm',
    'l',
    'E',
    'g',
    'order',
    'free',
    'K',
    'u',
    'gamma',
    'at',
    'points',
    'scan',
    'sharp',
    'p',
    'reduced',
    'from',
    'deg',
    'finite',
  ];
  for (const name of names) {
    const spec = sound(`model a { mass reduced 1 coupling ${name} = 2 interaction v(q) = ${name}*exp(-q^2) }`);
    expect(spec.couplings[0].name).toBe(name);
  }
});

test('names are compared in NFKC, subscript digits being digits', () => {
  const spec = sound('model a { mass reduced 1 coupling c₀ = 1 coupling µ = 2 interaction v(p, k) = c0*μ }');
  expect(spec.couplings.map(({ name }) => name)).toEqual(['c0', 'μ']);
  check(`model a { mass reduced 1 coupling c = 2
interaction v(p, k) = c*p²*k^2 }
                         ^ syntax: write \`^2\`
`);
});

test('1..2 is a range, and `(12 points)` never a call', () => {
  const spec = sound('model a { mass reduced 1 const top = 2. interaction v(p, k) = 1 series to 1 at p = 1..top (3 points), .5, 5. }');
  expect(spec.series.points.map(({ p }) => p)).toEqual([1, 1.5, 2, 0.5, 5]);
});

const inKernel = (rest: string) => `model a { mass reduced 1 coupling c = 2
interaction v(p, k) = ${rest} }
`;

test.each([
  ['2pi\n                       ^^ syntax: A product needs its sign: write `2*pi`'],
  ['2(p*k)\n                       ^ syntax: A product needs its sign: write `2*(…)`'],
  ['c(p*k)\n                       ^ syntax: A product needs its sign: write `c*(…)`'],
  ['c oder 2\n                        ^^^^ syntax: did you mean `order`?'],
  ['1,5\n                       ^ syntax: A decimal point is written `.`: write `1.5`'],
  ['c*\n                        ! syntax: missing here'],
  ['(c\n                        ! syntax: `)` is missing'],
  ['c +* c\n                         ^ syntax: a parenthesis must stand here, not `*`'],
  ['c $ 2\n                        ^ syntax: `$` has no meaning here'],
  ['c order 1.5\n                              ^^^ syntax: A whole number must stand here'],
  ['c order 0\n                        ^^^^^^^ not-evaluated'],
  ["sin'(p)\n                      ^^^ syntax: Only `delta` takes primes"],
  ['sine(p)\n                      ^^^^ unknown-name: did you mean `sin`'],
  ['besselj(p)\n                      ^^^^^^^ syntax: two arguments'],
  ['"c"\n                      ^^^ syntax'],
])('one message for %s', drawn => {
  const [first, mark] = drawn.split('\n');
  check(`${inKernel(first)}${mark}`);
});

test('structure: braces, strays, reserved words as names', () => {
  check(`coupling c = 2
^^^^^^^^ syntax: stands inside a model
model a {
  nonsense here
  ^^^^^^^^ syntax: begins no statement
  mass reduced 1
  interaction v(p, k) = 1
model b {
^^^^^ syntax: A \`}\` is missing before this
  mass reduced 1
  coupling mass = 3
           ^^^^ syntax: begins a statement and cannot be a name
  interaction v(p, k) = 1
}
}
^ syntax: closes no model
model c { mass reduced 1 interaction v(p, k) = 1
                                                ! syntax: The \`}\` that ends the model \`c\` is missing`);
});

test('a misspelt statement is one mistake, whatever it would have declared', () => {
  check(`model a {
  copling c0 = 1
  ^^^^^^^ syntax: did you mean \`coupling\`?
  mass reduced 1
  coupling c1 = 2
  mas reduced 3
  ^^^ syntax: did you mean \`mass\`?
  interaction v(p, k) = c0 + c1
}`);
});

test('200 deep is read, 201 is one message', () => {
  const deep = (n: number) => [
    `${'('.repeat(n)}1${')'.repeat(n)}`,
    `${'-'.repeat(n)}1`,
    `${'1^'.repeat(n)}1`,
    `${'cos('.repeat(n)}1${')'.repeat(n)}`,
  ];
  for (const formula of deep(200)) sound(inKernel(formula));
  for (const formula of deep(201))
    expect(everyProblem(read(inKernel(formula))).map(({ message }) => message)).toEqual([expect.stringContaining('200 deep')]);
});

test('megabytes of digits, signs and words end in a message each', () => {
  for (const much of ['1'.repeat(1e6), '+1'.repeat(2e5), '1+'.repeat(2e5), '$'.repeat(1e5)]) {
    const problems = everyProblem(read(inKernel(much)));
    expect(problems).toHaveLength(1);
    expect(problems[0].message.length).toBeLessThan(200);
  }
});

test('a file without a model, and what stands between models', () => {
  check('\n! missing: no model');
  expect(everyProblem(read('7'.repeat(1e6)))).toHaveLength(1);
  check(`const a = 1 +
             ! syntax: missing here
use other
    ^^^^^ syntax: A path in quotes must stand here
model b { mass reduced 1 interaction v(p, k) = a }`);
});

import type { IParserErrorMessageProvider } from 'chevrotain';

/** What the grammar wants at a place, in words that end "… is missing here" and "Here … must stand, not `x`". */
export const expected = {
  operand: 'a number, a name or a parenthesis',
  unitPower: 'the whole power of a unit',
  mass: '`reduced` and a mass, or two masses,',
  secondMass: 'a second mass (or `reduced` before a single one)',
  units: '`natural` or an energy and a length unit such as `MeV, fm`',
  wave: '`full`, `even`, `odd`, `m = …` or `l = …`',
  value: '`= …` or `free`',
  kernel: 'p, k or p, k, E or q or x or r',
  form: '`(p, k) = …` or `of` an interaction',
  shape: 'the shape of the cutoff, `sharp`, `gaussian(n)` or `pole(n)`,',
  axis: '`p`, `E` or `E_lab`',
  scheme: '`at p = …`, `at kappa = …` or `minimal at …`',
  scale: '`p` or `kappa`',
  expectation: '`finite`, `converges`, `drift` or an observable',
} as const;

/** Leaves only what was expected in the parser's messages; `explain` makes the sentence. */
export const messages: IParserErrorMessageProvider = {
  buildMismatchTokenMessage: ({ expected: type }) => type.LABEL ?? type.name,
  buildNotAllInputParsedMessage: () => '',
  buildNoViableAltMessage: ({ customUserDescription }) => customUserDescription ?? '',
  buildEarlyExitMessage: ({ customUserDescription }) => customUserDescription ?? '',
};

import { EmbeddedActionsParser, tokenMatcher, type IToken, type ParserMethod } from 'chevrotain';
import type { Span } from './document';
import { expected, messages } from './expected';
import type { Formula, UnitPower, Whole, Word } from './syntax';
import * as t from './tokens';
import { words as w } from './tokens';

/** How deep parentheses, calls, signs and powers may stand in each other. */
export const deepest = 200;

/** Thrown where an expression is nested deeper than `deepest`; carries the word that goes too deep. */
export class TooDeep extends Error {
  constructor(readonly token: IToken) {
    super('too deep');
  }
}

export type Rule<T> = ParserMethod<[], T>;

// While the grammar records itself, words have no image and expressions no span.
export const endOf = (token: IToken): number => token.startOffset + (token.image ?? '').length;
export const spanOf = (from: IToken, to: IToken = from): Span => ({ start: from.startOffset, end: endOf(to) });
export const word = (token: IToken): Word => ({ name: token.payload as string, span: spanOf(token) });
export const whole = (token: IToken): Whole => ({ value: Number(token.image), span: spanOf(token) });

/** The grammar of expressions and units, without recovery: the first mistake ends the statement. */
export class ExpressionGrammar extends EmbeddedActionsParser {
  /** Where the last complete expression ended: tells a missing `*` from another missing word. */
  expressionEnd = -1;
  private depth = 0;

  constructor() {
    super(t.allTokens, { maxLookahead: 2, recoveryEnabled: false, errorMessageProvider: messages });
  }

  /** Starts on the words of another statement. */
  begin(tokens: IToken[]): void {
    this.input = tokens;
    this.depth = 0;
    this.expressionEnd = -1;
  }

  private nested<T>(parse: () => T): T {
    if (!this.RECORDING_PHASE && ++this.depth > deepest) throw new TooDeep(this.LA(1));
    const result = parse();
    this.depth--;
    return result;
  }

  protected ahead(distance: number, type: (typeof t.allTokens)[number]): boolean {
    return tokenMatcher(this.LA(distance), type);
  }

  readonly expression: Rule<Formula> = this.RULE('expression', (): Formula => {
    let left = this.SUBRULE(this.term);
    this.MANY(() => {
      const operator = this.CONSUME(t.Additive);
      const right = this.SUBRULE2(this.term);
      left = binary(operator.image === '+' ? 'add' : 'subtract', left, right);
    });
    this.ACTION(() => (this.expressionEnd = left.span.end));
    return left;
  });

  private readonly term: Rule<Formula> = this.RULE('term', (): Formula => {
    let left = this.SUBRULE(this.factor);
    this.MANY(() => {
      const operator = this.CONSUME(t.Multiplicative);
      const right = this.SUBRULE2(this.factor);
      left = binary(operator.image === '*' ? 'multiply' : 'divide', left, right);
    });
    return left;
  });

  private readonly factor: Rule<Formula> = this.RULE('factor', (): Formula =>
    this.OR({
      DEF: [
        {
          ALT: () => {
            const sign = this.CONSUME(t.Additive);
            const of = this.nested(() => this.SUBRULE(this.factor));
            const span = this.ACTION(() => ({ start: sign.startOffset, end: of.span.end }));
            return sign.image === '-' ? { kind: 'negate' as const, of, span } : { kind: 'group' as const, of, span };
          },
        },
        {
          ALT: () => {
            const base = this.SUBRULE(this.atom);
            let result: Formula = base;
            this.OPTION({
              GATE: () => base.kind !== 'name' && this.ahead(1, t.UnitWord),
              DEF: () => {
                const units = this.SUBRULE(this.unitPowers);
                result = this.ACTION(() => ({
                  kind: 'quantity' as const,
                  of: base,
                  units,
                  span: { start: base.span.start, end: units[units.length - 1].span.end },
                }));
              },
            });
            this.OPTION2({
              GATE: () => result === base,
              DEF: () => {
                this.CONSUME(t.Caret);
                const right = this.nested(() => this.SUBRULE2(this.factor));
                result = binary('power', base, right);
              },
            });
            return result;
          },
        },
      ],
      ERR_MSG: expected.operand,
    }),
  );

  private readonly atom: Rule<Formula> = this.RULE('atom', (): Formula =>
    this.OR<Formula>({
      DEF: [
        {
          ALT: () => {
            const number = this.CONSUME(t.NumberWord);
            return { kind: 'number', value: Number(number.image), text: number.image, span: spanOf(number) };
          },
        },
        {
          ALT: () => {
            const open = this.CONSUME(t.Open);
            const of = this.nested(() => this.SUBRULE(this.expression));
            const close = this.CONSUME(t.Close);
            return { kind: 'group', of, span: spanOf(open, close) };
          },
        },
        {
          ALT: () => {
            const name = word(this.CONSUME(t.Name));
            let primes = 0;
            this.MANY(() => {
              this.CONSUME(t.Prime);
              primes++;
            });
            let result: Formula = { kind: 'name', name: name.name, span: name.span };
            this.OPTION({
              GATE: () => !(this.ahead(2, t.Int) && this.ahead(3, w.points)),
              DEF: () => {
                const open = this.CONSUME2(t.Open);
                const args: Formula[] = [];
                this.nested(() =>
                  this.AT_LEAST_ONE_SEP({ SEP: t.Comma, DEF: () => args.push(this.SUBRULE2(this.expression)), ERR_MSG: expected.operand }),
                );
                const close = this.CONSUME2(t.Close);
                const span = this.ACTION(() => ({ start: name.span.start, end: close.startOffset + 1 }));
                result = { kind: 'call', function: name, primes, arguments: args, open: spanOf(open), span };
              },
            });
            if (primes > 0 && result.kind === 'name') this.CONSUME3(t.Open);
            return result;
          },
        },
      ],
      ERR_MSG: expected.operand,
    }),
  );

  protected readonly unitPowers: Rule<UnitPower[]> = this.RULE('unitPowers', (): UnitPower[] => {
    const units: UnitPower[] = [this.SUBRULE(this.unitPower)];
    this.MANY({
      GATE: () => this.ahead(2, t.UnitWord),
      DEF: () => {
        const operator = this.CONSUME(t.Multiplicative);
        const next = this.SUBRULE2(this.unitPower);
        units.push(operator.image === '/' ? { ...next, power: -next.power } : next);
      },
    });
    return units;
  });

  private readonly unitPower: Rule<UnitPower> = this.RULE('unitPower', (): UnitPower => {
    const unit = this.CONSUME(t.UnitWord);
    let [power, last] = [1, unit];
    this.OPTION(() => {
      this.CONSUME(t.Caret);
      let sign = 1;
      this.OPTION2(() => {
        sign = this.CONSUME(t.Additive).image === '-' ? -1 : 1;
      });
      last = this.CONSUME(t.Int, { ERR_MSG: expected.unitPower });
      power = sign * Number(last.image);
    });
    return { unit: unit.payload as string, power, span: spanOf(unit, last) };
  });
}

const binary = (kind: 'add' | 'subtract' | 'multiply' | 'divide' | 'power', left: Formula, right: Formula): Formula => ({
  kind,
  left,
  right,
  span: { start: left.span?.start, end: right.span?.end },
});

import type { IToken } from 'chevrotain';
import type { CutoffShape, Observable } from '../core/model/spec';
import { expected } from './expected';
import { ExpressionGrammar, spanOf, whole, word, type Rule } from './expression-grammar';
import type {
  Axis,
  Column,
  Expectation,
  Factor,
  Formula,
  Item,
  Kernel,
  Point,
  Range,
  Scheme,
  StatementBody,
  WaveWords,
  Whole,
  Word,
  WrittenMonomial,
} from './syntax';
import * as t from './tokens';
import { words as w } from './tokens';

type Form = Extract<StatementBody, { kind: 'counterterm' }>['form'];

const observable = (token: IToken) => word(token) as Word & { readonly name: Observable };

/** The grammar of one statement, rule for rule as the language's appendix gives it. */
export class StatementGrammar extends ExpressionGrammar {
  constructor() {
    super();
    this.performSelfAnalysis();
  }

  readonly use: Rule<StatementBody> = this.RULE('use', (): StatementBody => {
    this.CONSUME(t.Reserved);
    return { kind: 'use', path: this.CONSUME(t.Text).image.slice(1, -1) };
  });

  readonly const: Rule<StatementBody> = this.RULE('const', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    this.CONSUME(t.Equals);
    return { kind: 'const', name, value: this.SUBRULE(this.expression) };
  });

  readonly model: Rule<StatementBody> = this.RULE('model', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    let from: Word | null = null;
    this.OPTION(() => {
      this.CONSUME(w.from);
      from = word(this.CONSUME2(t.Name));
    });
    this.CONSUME(t.OpenBrace);
    return { kind: 'model', name, from };
  });

  readonly units: Rule<StatementBody> = this.RULE('units', (): StatementBody => {
    this.CONSUME(t.Reserved);
    return this.OR<StatementBody>({
      DEF: [
        { ALT: () => (this.CONSUME(w.natural), { kind: 'units', system: null }) },
        {
          ALT: () => {
            const energy = word(this.CONSUME(t.UnitWord));
            this.CONSUME(t.Comma);
            return { kind: 'units', system: { energy, length: word(this.CONSUME2(t.UnitWord)) } };
          },
        },
      ],
      ERR_MSG: expected.units,
    });
  });

  readonly dimension: Rule<StatementBody> = this.RULE('dimension', (): StatementBody => {
    this.CONSUME(t.Reserved);
    return { kind: 'dimension', value: whole(this.CONSUME(t.Int)) };
  });

  readonly wave: Rule<StatementBody> = this.RULE('wave', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const first = this.LA(1);
    const wave = this.OR<WaveWords>({
      DEF: [
        { ALT: () => (this.CONSUME(w.full), { kind: 'full' }) },
        { ALT: () => (this.CONSUME(w.even), { kind: 'even' }) },
        { ALT: () => (this.CONSUME(w.odd), { kind: 'odd' }) },
        { ALT: () => (this.CONSUME(w.m), { kind: 'm', numbers: this.SUBRULE(this.wholeNumbers) }) },
        { ALT: () => (this.CONSUME(w.l), { kind: 'l', numbers: this.SUBRULE2(this.wholeNumbers) }) },
      ],
      ERR_MSG: expected.wave,
    });
    return { kind: 'wave', wave, span: spanOf(first, this.LA(0)) };
  });

  private readonly wholeNumbers: Rule<Whole[]> = this.RULE('wholeNumbers', (): Whole[] => {
    const numbers: Whole[] = [];
    this.CONSUME(t.Equals);
    this.AT_LEAST_ONE_SEP({ SEP: t.Comma, DEF: () => numbers.push(whole(this.CONSUME(t.Int))), ERR_MSG: t.Int.LABEL });
    return numbers;
  });

  readonly mass: Rule<StatementBody> = this.RULE('mass', (): StatementBody => {
    this.CONSUME(t.Reserved);
    return this.OR<StatementBody>({
      DEF: [
        { ALT: () => (this.CONSUME(w.reduced), { kind: 'mass', reduced: this.SUBRULE(this.expression), masses: null }) },
        {
          ALT: () => {
            const first = this.SUBRULE2(this.expression);
            this.CONSUME(t.Comma, { ERR_MSG: expected.secondMass });
            return { kind: 'mass', reduced: null, masses: [first, this.SUBRULE3(this.expression)] };
          },
        },
      ],
      ERR_MSG: expected.mass,
      IGNORE_AMBIGUITIES: true,
    });
  });

  readonly kinetic: Rule<StatementBody> = this.RULE('kinetic', (): StatementBody => {
    this.CONSUME(t.Reserved);
    this.CONSUME(t.Open);
    const k = word(this.CONSUME(w.k));
    this.CONSUME(t.Close);
    this.CONSUME(t.Equals);
    return { kind: 'kinetic', arguments: [k], value: this.SUBRULE(this.expression) };
  });

  readonly propagator: Rule<StatementBody> = this.RULE('propagator', (): StatementBody => {
    this.CONSUME(t.Reserved);
    this.CONSUME(t.Open);
    const k = word(this.CONSUME(w.k));
    this.CONSUME(t.Comma);
    const E = word(this.CONSUME(w.E));
    this.CONSUME(t.Close);
    this.CONSUME(t.Equals);
    return { kind: 'propagator', arguments: [k, E], value: this.SUBRULE(this.expression) };
  });

  readonly coupling: Rule<StatementBody> = this.RULE('coupling', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    const value = this.OR<Formula | null>({
      DEF: [{ ALT: () => (this.CONSUME(t.Equals), this.SUBRULE(this.expression)) }, { ALT: () => (this.CONSUME(w.free), null) }],
      ERR_MSG: expected.value,
    });
    return { kind: 'coupling', name, value };
  });

  readonly interaction: Rule<StatementBody> = this.RULE('interaction', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    const kernel = this.SUBRULE(this.kernel);
    this.CONSUME(t.Equals);
    const value = this.SUBRULE(this.expression);
    let order: Whole | null = null;
    let orderSpan = value.span;
    this.OPTION(() => {
      const first = this.CONSUME(w.order);
      const last = this.CONSUME(t.Int);
      order = whole(last);
      orderSpan = spanOf(first, last);
    });
    return { kind: 'interaction', name, kernel, value, order, orderSpan };
  });

  private readonly kernel: Rule<Kernel> = this.RULE('kernel', (): Kernel => {
    this.CONSUME(t.Open);
    const single = (token: IToken): Kernel => ({ arguments: token.image as 'q' | 'x' | 'r', words: [word(token)], element: null });
    const kernel = this.OR<Kernel>({
      DEF: [
        { ALT: () => this.SUBRULE(this.momenta) },
        { ALT: () => single(this.CONSUME(w.q)) },
        { ALT: () => single(this.CONSUME(w.x)) },
        { ALT: () => single(this.CONSUME(w.r)) },
      ],
      ERR_MSG: expected.kernel,
    });
    this.CONSUME(t.Close);
    let element: Kernel['element'] = null;
    this.OPTION(() => {
      const open = this.CONSUME(t.OpenBracket);
      const out = whole(this.CONSUME(t.Int));
      this.CONSUME(t.Comma);
      const into = whole(this.CONSUME2(t.Int));
      element = { out, in: into, span: spanOf(open, this.CONSUME(t.CloseBracket)) };
    });
    return { ...kernel, element };
  });

  private readonly momenta: Rule<Kernel> = this.RULE('momenta', (): Kernel => {
    const names = [word(this.CONSUME(w.p))];
    this.CONSUME(t.Comma);
    names.push(word(this.CONSUME(w.k)));
    this.OPTION(() => {
      this.CONSUME2(t.Comma);
      names.push(word(this.CONSUME(w.E)));
    });
    return { arguments: names.length === 3 ? 'pkE' : 'pk', words: names, element: null };
  });

  readonly cutoff: Rule<StatementBody> = this.RULE('cutoff', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    this.CONSUME(t.Equals);
    const value = this.SUBRULE(this.expression);
    const first = this.LA(1);
    const shape = this.OR<CutoffShape>({
      DEF: [
        { ALT: () => (this.CONSUME(w.sharp), { kind: 'sharp' }) },
        { ALT: () => (this.CONSUME(w.gaussian), { kind: 'gaussian', n: this.SUBRULE(this.exponent) }) },
        { ALT: () => (this.CONSUME(w.pole), { kind: 'pole', n: this.SUBRULE2(this.exponent) }) },
      ],
      ERR_MSG: expected.shape,
    });
    const shapeSpan = spanOf(first, this.LA(0));
    let scan: Range | null = null;
    this.OPTION(() => {
      this.CONSUME(w.scan);
      const from = this.SUBRULE2(this.expression);
      this.CONSUME(t.DotDot);
      scan = { from, to: this.SUBRULE3(this.expression), points: this.SUBRULE(this.count) };
    });
    return { kind: 'cutoff', name, value, shape, shapeSpan, scan };
  });

  private readonly exponent: Rule<number> = this.RULE('exponent', (): number => {
    this.CONSUME(t.Open);
    const n = whole(this.CONSUME(t.Int));
    this.CONSUME(t.Close);
    return n.value;
  });

  private readonly count: Rule<Whole | null> = this.RULE('count', (): Whole | null => {
    let points: Whole | null = null;
    this.OPTION(() => {
      this.CONSUME(t.Open);
      points = whole(this.CONSUME(t.Int));
      this.CONSUME(w.points);
      this.CONSUME(t.Close);
    });
    return points;
  });

  readonly series: Rule<StatementBody> = this.RULE('series', (): StatementBody => {
    this.CONSUME(t.Reserved);
    this.CONSUME(w.to);
    const order = whole(this.CONSUME(t.Int));
    let at: Extract<StatementBody, { kind: 'series' }>['at'] = null;
    this.OPTION(() => {
      this.CONSUME(w.at);
      const axis = this.SUBRULE(this.axis);
      this.CONSUME(t.Equals);
      const items: Item[] = [];
      this.AT_LEAST_ONE_SEP({ SEP: t.Comma, DEF: () => items.push(this.SUBRULE(this.item)), ERR_MSG: expected.operand });
      at = { axis: axis.name as Axis, axisSpan: axis.span, items };
    });
    return { kind: 'series', order, at };
  });

  private readonly axis: Rule<Word> = this.RULE('axis', (): Word =>
    word(
      this.OR({
        DEF: [{ ALT: () => this.CONSUME(w.p) }, { ALT: () => this.CONSUME(w.E) }, { ALT: () => this.CONSUME(w.E_lab) }],
        ERR_MSG: expected.axis,
      }),
    ),
  );

  private readonly item: Rule<Item> = this.RULE('item', (): Item => {
    const value = this.SUBRULE(this.expression);
    let item: Item = { kind: 'value', value };
    this.OPTION(() => {
      this.CONSUME(t.DotDot);
      item = { kind: 'range', from: value, to: this.SUBRULE2(this.expression), points: this.SUBRULE(this.count) };
    });
    return item;
  });

  private readonly point: Rule<Point> = this.RULE('point', (): Point => {
    const at = this.CONSUME(w.at);
    const axis = this.SUBRULE(this.axis);
    this.CONSUME(t.Equals);
    const value = this.SUBRULE(this.expression);
    return { axis: axis.name as Axis, axisSpan: axis.span, value, span: { start: at.startOffset, end: value.span?.end } };
  });

  readonly counterterm: Rule<StatementBody> = this.RULE('counterterm', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    const form = this.OR<Form>({
      DEF: [
        {
          ALT: () => {
            this.CONSUME(t.Open);
            const { arguments: args, words: names } = this.SUBRULE(this.momenta);
            this.CONSUME(t.Close);
            this.CONSUME(t.Equals);
            return { arguments: args as 'pk' | 'pkE', words: names, value: this.SUBRULE(this.expression) };
          },
        },
        { ALT: () => (this.CONSUME(w.of), { of: word(this.CONSUME2(t.Name)) }) },
      ],
      ERR_MSG: expected.form,
    });
    this.CONSUME(w.cancels);
    const cancels: WrittenMonomial[] = [];
    this.AT_LEAST_ONE_SEP({ SEP: t.Comma, DEF: () => cancels.push(this.SUBRULE(this.monomial)), ERR_MSG: t.Name.LABEL });
    this.CONSUME(w.subtract);
    return { kind: 'counterterm', name, form, cancels, scheme: this.SUBRULE(this.scheme) };
  });

  private readonly monomial: Rule<WrittenMonomial> = this.RULE('monomial', (): WrittenMonomial => {
    const first = this.LA(1);
    const factors: Factor[] = [];
    this.AT_LEAST_ONE_SEP({
      SEP: t.Star,
      DEF: () => {
        const name = word(this.CONSUME(t.Name));
        let power: Whole | null = null;
        this.OPTION(() => {
          this.CONSUME(t.Caret);
          power = whole(this.CONSUME(t.Int));
        });
        factors.push({ name, power });
      },
      ERR_MSG: t.Name.LABEL,
    });
    return { factors, span: spanOf(first, this.LA(0)) };
  });

  private readonly scheme: Rule<Scheme> = this.RULE('scheme', (): Scheme =>
    this.OR<Scheme>({
      DEF: [
        { ALT: () => (this.CONSUME(w.minimal), this.CONSUME(w.at), { kind: 'minimal', at: this.SUBRULE(this.expression) }) },
        {
          ALT: () => {
            this.CONSUME2(w.at);
            const kind = this.OR2<'p' | 'kappa'>({
              DEF: [{ ALT: () => (this.CONSUME(w.p), 'p') }, { ALT: () => (this.CONSUME(w.kappa), 'kappa') }],
              ERR_MSG: expected.scale,
            });
            this.CONSUME(t.Equals);
            return { kind, at: this.SUBRULE2(this.expression) };
          },
        },
      ],
      ERR_MSG: expected.scheme,
    }),
  );

  readonly fix: Rule<StatementBody> = this.RULE('fix', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    this.CONSUME(w.with);
    const what = observable(this.CONSUME(t.ObservableWord));
    this.CONSUME(t.Equals);
    const value = this.SUBRULE(this.expression);
    let point: Point | null = null;
    this.OPTION(() => {
      point = this.SUBRULE(this.point);
    });
    this.OPTION2(() => {
      this.CONSUME(w.order);
      this.CONSUME(w.by);
      this.CONSUME2(w.order);
    });
    return { kind: 'fix', name, observable: what, value, point };
  });

  readonly data: Rule<StatementBody> = this.RULE('data', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const name = word(this.CONSUME(t.Name));
    this.CONSUME(t.Equals);
    const path = this.CONSUME(t.Text).image.slice(1, -1);
    this.CONSUME(w.columns);
    const columns: Column[] = [];
    this.AT_LEAST_ONE_SEP({ SEP: t.Comma, DEF: () => columns.push(this.SUBRULE(this.column)), ERR_MSG: t.Name.LABEL });
    return { kind: 'data', name, path, columns };
  });

  private readonly column: Rule<Column> = this.RULE('column', (): Column => {
    const name = word(this.CONSUME(t.Name));
    let units: Column['units'] = null;
    this.OPTION(() => {
      this.CONSUME(t.OpenBracket);
      units = this.OR<Column['units']>({
        DEF: [{ ALT: () => (this.CONSUME(w.deg), 'deg') }, { ALT: () => this.SUBRULE(this.unitPowers) }],
        ERR_MSG: t.UnitWord.LABEL,
      });
      this.CONSUME(t.CloseBracket);
    });
    return { name, units };
  });

  readonly expect: Rule<StatementBody> = this.RULE('expect', (): StatementBody => {
    this.CONSUME(t.Reserved);
    const expectation = this.OR<Expectation>({
      DEF: [
        { ALT: () => this.SUBRULE(this.finite) },
        { ALT: () => (this.CONSUME(w.converges), { kind: 'converges', point: this.SUBRULE(this.point) }) },
        {
          ALT: () => {
            this.CONSUME(w.drift);
            this.CONSUME(t.Less);
            const percent = this.SUBRULE(this.expression);
            this.CONSUME(t.Percent);
            return { kind: 'drift', percent, point: this.SUBRULE2(this.point) };
          },
        },
        { ALT: () => this.SUBRULE(this.observation) },
      ],
      ERR_MSG: expected.expectation,
    });
    return { kind: 'expect', expectation };
  });

  private readonly finite: Rule<Expectation> = this.RULE('finite', (): Expectation => {
    this.CONSUME(w.finite);
    let to: Whole | null = null;
    this.OPTION(() => {
      this.CONSUME(w.to);
      to = whole(this.CONSUME(t.Int));
    });
    return { kind: 'finite', to };
  });

  private readonly observation: Rule<Expectation> = this.RULE('observation', (): Expectation => {
    const what = observable(this.CONSUME(t.ObservableWord));
    this.CONSUME(t.Equals);
    const value = this.SUBRULE(this.expression);
    this.CONSUME(w.within);
    const within = this.SUBRULE2(this.expression);
    let percent = false;
    this.OPTION(() => {
      this.CONSUME(t.Percent);
      percent = true;
    });
    let point: Point | null = null;
    this.OPTION2(() => {
      point = this.SUBRULE(this.point);
    });
    return { kind: 'observable', observable: what, value, within, percent, point };
  });
}

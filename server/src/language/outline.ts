import type { Problem, Span } from './document';
import { misspelt, misspeltStatement } from './explain';
import { shown } from './names';
import { parseStatement } from './parse';
import { cut, type Piece } from './pieces';
import type { ParsedStatement, Remark, StatementBody, Word } from './syntax';
import { tokenize } from './tokens';
import type { ReservedWord } from './words';

/** A statement in its place in the text. */
export interface Statement<B extends StatementBody = StatementBody> {
  readonly word: ReservedWord;
  readonly body: B;
  readonly span: Span;
}

/** What is known of a statement that could not be read: enough to keep its mistake from causing others. */
export interface Broken {
  readonly word: ReservedWord;
  readonly name: string | null;
}

export interface Block {
  readonly statements: Statement[];
  readonly broken: Broken[];
  readonly problems: Problem[];
}

export interface ModelBlock extends Block {
  readonly name: Word;
  readonly from: Word | null;
  /** From `model` to `}`. */
  readonly span: Span;
  readonly insertAt: number;
}

export interface Outline extends Block {
  readonly models: readonly ModelBlock[];
}

type Draft = { -readonly [K in keyof ModelBlock]: ModelBlock[K] };

/** The statements of a text by model. Never throws. */
export function outline(text: string): Outline {
  return new Outliner(text).run();
}

const shift = (span: Span, by: number): Span => ({ start: span.start + by, end: span.end + by });

class Outliner {
  private readonly file: Outline & { models: Draft[] } = { statements: [], broken: [], problems: [], models: [] };
  private open: Draft | null = null;

  constructor(private readonly text: string) {}

  run(): Outline {
    const pieces = cut(this.text);
    for (let i = 0; i < pieces.length; i++) {
      const piece = pieces[i];
      if (piece.kind === 'close') this.close(piece);
      else if (piece.kind === 'stray') this.stray(piece);
      else if (this.statement(piece, pieces[i + 1])) i++;
    }
    if (this.open !== null) {
      const end = pieces[pieces.length - 1].end;
      this.problem({ start: end, end }, `The \`}\` that ends the model \`${shown(this.open.name.name)}\` is missing.`);
      this.finish(end, end);
    }
    // A file of something else altogether has said so already.
    if (this.file.models.length === 0 && this.file.problems.length === 0 && !this.file.broken.some(broken => broken.word === 'model')) {
      const message = 'This file has no model; write one as `model NAME { … }`.';
      this.file.problems.push({ code: 'missing', severity: 'error', message, span: { start: 0, end: 0 } });
    }
    return this.file;
  }

  private get block(): Block {
    return this.open ?? this.file;
  }

  private problem(span: Span, message: string): void {
    this.block.problems.push({ code: 'syntax', severity: 'error', message, span });
  }

  private remark(remark: Remark, offset: number): void {
    const { code, message, span, mend } = remark;
    const severity = code === 'reading' ? 'hint' : 'error';
    const moved = mend && { ...mend, span: shift(mend.span, offset) };
    this.block.problems.push({ code, severity, message, span: shift(span, offset), ...(moved && { mend: moved }) });
    if (remark.misspelt) this.block.broken.push({ word: remark.misspelt.meant, name: remark.misspelt.name?.name ?? null });
  }

  private close(piece: Piece): void {
    if (this.open === null) this.problem(piece, 'This `}` closes no model; take it out.');
    else this.finish(piece.end, piece.start);
  }

  private finish(end: number, insertAt: number): void {
    const model = this.open!;
    model.span = { start: model.span.start, end };
    model.insertAt = insertAt;
    this.open = null;
  }

  private stray(piece: Piece): void {
    const { tokens, mistakes } = tokenize(this.text.slice(piece.start, piece.end));
    if (mistakes.length > 0) {
      for (const mistake of mistakes) this.remark({ code: 'syntax', ...mistake }, piece.start);
      return;
    }
    const [first, second] = tokens;
    const span = { start: first.startOffset, end: first.startOffset + first.image.length };
    const meant = first.payload === undefined ? null : misspelt(first.payload as string);
    if (meant !== null) return this.remark(misspeltStatement(meant, first.image, second, span), piece.start);
    const words = this.open === null ? '`model`, `const` or `use`' : 'a word such as `coupling` or `interaction`';
    this.remark({ code: 'syntax', span, message: `\`${shown(first.image)}\` begins no statement; one begins with ${words}.` }, piece.start);
  }

  /** Takes in a statement. True where the next piece belongs to it: a reserved word where a name should stand. */
  private statement(piece: Extract<Piece, { kind: 'statement' }>, next: Piece | undefined): boolean {
    const parsed = parseStatement(piece.word, this.text.slice(piece.start, piece.end));
    const here = { start: piece.start, end: piece.start + piece.word.length };
    if (parsed.endsEarly && next?.kind === 'statement' && this.isNameAt(piece.end, next)) {
      const span = { start: next.start, end: next.start + next.word.length };
      this.problem(span, `\`${next.word}\` begins a statement and cannot be a name; choose another one.`);
      this.block.broken.push({ word: piece.word, name: parsed.name?.name ?? null });
      return true;
    }
    if (piece.word === 'model') this.model(piece, parsed);
    else if (piece.word === 'use' && this.open !== null) this.problem(here, '`use` stands at the top of the file, not inside a model.');
    else if (piece.word !== 'use' && piece.word !== 'const' && this.open === null) {
      this.problem(here, `\`${piece.word}\` stands inside a model: write it between the braces of \`model NAME { … }\`.`);
    } else this.keep(piece, parsed);
    return false;
  }

  private keep(piece: Piece & { word: ReservedWord }, parsed: ParsedStatement): void {
    for (const remark of parsed.remarks) this.remark(remark, piece.start);
    if (parsed.body !== null)
      this.block.statements.push({ word: piece.word, body: parsed.body, span: { start: piece.start, end: piece.end } });
    else this.block.broken.push({ word: piece.word, name: parsed.name?.name ?? null });
  }

  /** Is the reserved word that begins `next` meant as a name, on the same line as what ends at `end`? */
  private isNameAt(end: number, next: Extract<Piece, { kind: 'statement' }>): boolean {
    if (/[\r\n#]/.test(this.text.slice(end, next.start))) return false;
    return parseStatement(next.word, this.text.slice(next.start, next.end)).body === null;
  }

  private model(piece: Piece, parsed: ParsedStatement): void {
    if (this.open !== null) {
      this.problem(
        { start: piece.start, end: piece.start + 5 },
        `A \`}\` is missing before this: the model \`${shown(this.open.name.name)}\` is still open.`,
      );
      this.finish(piece.start, piece.start);
    }
    const { body } = parsed;
    const header = body?.kind === 'model' ? body : null;
    const name = parsed.name ?? { name: '', span: { start: 0, end: 5 } };
    const place = { name: name.name, span: shift(name.span, piece.start) };
    const from = header?.from ? { name: header.from.name, span: shift(header.from.span, piece.start) } : null;
    const span = { start: piece.start, end: piece.end };
    this.open = { name: place, from, span, insertAt: piece.end, statements: [], broken: [], problems: [] };
    this.file.models.push(this.open);
    for (const remark of parsed.remarks) this.remark(remark, piece.start);
  }
}

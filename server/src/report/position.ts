import type { Span } from '../language/document';

/** Counted from 0; `character` in UTF-16 units. */
export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface Range {
  readonly start: Position;
  readonly end: Position;
}

/** Lines of a text, ended by LF, CR LF or CR. */
export class Lines {
  private readonly starts: number[] = [0];

  constructor(private readonly text: string) {
    for (const end of text.matchAll(/\r\n|\n|\r/g)) this.starts.push(end.index + end[0].length);
  }

  position(offset: number): Position {
    const inside = Math.max(0, Math.min(offset, this.text.length));
    let [low, high] = [0, this.starts.length - 1];
    while (low < high) {
      const middle = Math.ceil((low + high) / 2);
      if (this.starts[middle] <= inside) low = middle;
      else high = middle - 1;
    }
    return { line: low, character: inside - this.starts[low] };
  }

  range({ start, end }: Span): Range {
    return { start: this.position(start), end: this.position(end) };
  }

  /** The line's text without its end. */
  line(index: number): string {
    const end = index + 1 < this.starts.length ? this.starts[index + 1] : this.text.length;
    return this.text.slice(this.starts[index], end).replace(/(\r\n|\n|\r)$/, '');
  }
}

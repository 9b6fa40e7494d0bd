/** Nothing is said about work that takes less than this, in milliseconds. */
const patience = 500;
/** Between two updates on a terminal. */
const pause = 100;

/** Tells on stderr what is going on once it takes a while: one line that changes on a terminal, one plain line a file elsewhere. */
export class Progress {
  private readonly begun = Date.now();
  private last = 0;
  private named = '';
  private shown = false;

  constructor(private readonly stream: { readonly isTTY?: boolean; write(text: string): unknown }) {}

  /** `done` runs from 0 to 1. */
  update(file: string, what: string, done: number): void {
    const now = Date.now();
    if (now - this.begun < patience) return;
    if (!this.stream.isTTY) {
      if (file !== this.named) this.stream.write(`checking ${file} …\n`);
      this.named = file;
    } else if (now - this.last >= pause) {
      this.last = now;
      this.shown = true;
      this.stream.write(`\r\u001b[2K${`checking ${file}: ${what}, ${Math.round(100 * done)} %`.slice(0, 78)}`);
    }
  }

  /** Leaves the terminal as it was. */
  end(): void {
    if (this.shown) this.stream.write('\r\u001b[2K');
  }
}

import type { Connection, WorkDoneProgressServerReporter } from 'vscode-languageserver/node';

/** Work that is over sooner than this is not spoken of, in ms. */
const silence = 500;

interface Work {
  readonly model: string;
  readonly done: number;
  readonly what: string;
}

/** Shows in the editor what is being evaluated, once that takes a while. */
export class Progress {
  private latest: Work | null = null;
  private timer: NodeJS.Timeout | undefined;
  private shown: Promise<WorkDoneProgressServerReporter | null> | null = null;

  constructor(private readonly connection: Connection) {}

  /** `null`: at rest. */
  show(work: Work | null): void {
    this.latest = work;
    if (work === null) return this.end();
    if (this.shown) void this.shown.then(reporter => this.latest === work && reporter?.report(percent(work), describe(work)));
    else this.timer ??= setTimeout(() => this.begin(), silence);
  }

  private begin(): void {
    // A client that refuses goes without.
    this.shown = this.connection.window.createWorkDoneProgress().catch(() => null);
    void this.shown.then(reporter => this.latest && reporter?.begin('Tare', percent(this.latest), describe(this.latest)));
  }

  private end(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
    void this.shown?.then(reporter => reporter?.done());
    this.shown = null;
  }
}

const percent = ({ done }: Work): number => Math.round(100 * Math.min(Math.max(done, 0), 1));
const describe = ({ model, what }: Work): string => (what === '' ? model : `${model}: ${what}`);

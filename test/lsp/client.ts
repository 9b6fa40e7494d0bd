import { type ChildProcessWithoutNullStreams, spawn } from 'node:child_process';
import { join } from 'node:path';
import {
  type CodeAction,
  type Diagnostic,
  type Hover,
  type InitializeResult,
  type MessageConnection,
  type Position,
  type PublishDiagnosticsParams,
  type Range,
  StreamMessageReader,
  StreamMessageWriter,
  createMessageConnection,
} from 'vscode-languageserver-protocol/node';

const program = join(import.meta.dirname, '../../dist/server.js');

export interface ClientOptions {
  readonly capabilities?: object;
  readonly initializationOptions?: object;
  /** What the client answers when it is asked for the settings. */
  readonly settings?: object;
}

/** An editor as the server knows it: a process at the other end of stdio. */
export class Client {
  readonly published: PublishDiagnosticsParams[] = [];
  readonly progress: object[] = [];
  readonly messages: string[] = [];
  settings: object;
  private readonly process: ChildProcessWithoutNullStreams;
  readonly connection: MessageConnection;
  readonly exited: Promise<number | null>;
  private waiting: (() => void)[] = [];

  constructor(private readonly options: ClientOptions = {}) {
    this.settings = options.settings ?? {};
    this.process = spawn(process.execPath, [program, '--stdio']);
    this.process.stderr.pipe(process.stderr);
    this.exited = new Promise(resolve => this.process.once('exit', resolve));
    this.connection = createMessageConnection(new StreamMessageReader(this.process.stdout), new StreamMessageWriter(this.process.stdin));
    this.connection.onNotification('textDocument/publishDiagnostics', (params: PublishDiagnosticsParams) => {
      this.published.push(params);
      for (const wake of this.waiting.splice(0)) wake();
    });
    this.connection.onNotification('$/progress', (params: object) => void this.progress.push(params));
    this.connection.onNotification('window/showMessage', ({ message }: { message: string }) => void this.messages.push(message));
    this.connection.onRequest('workspace/configuration', () => [this.settings]);
    this.connection.onRequest('window/workDoneProgress/create', () => null);
    this.connection.onRequest('client/registerCapability', () => null);
    this.connection.listen();
  }

  async start(): Promise<InitializeResult> {
    const { capabilities = {}, initializationOptions } = this.options;
    const result: InitializeResult = await this.connection.sendRequest('initialize', {
      processId: process.pid,
      rootUri: null,
      capabilities,
      initializationOptions,
    });
    await this.connection.sendNotification('initialized');
    return result;
  }

  /** Shuts the server down as the protocol asks for; gives its exit code. */
  async stop(): Promise<number | null> {
    await this.connection.sendRequest('shutdown');
    await this.connection.sendNotification('exit');
    return this.exited;
  }

  open(uri: string, text: string, version = 1): Promise<void> {
    return this.connection.sendNotification('textDocument/didOpen', { textDocument: { uri, languageId: 'tare', version, text } });
  }

  change(uri: string, version: number, ...contentChanges: { range?: Range; text: string }[]): Promise<void> {
    return this.connection.sendNotification('textDocument/didChange', { textDocument: { uri, version }, contentChanges });
  }

  close(uri: string): Promise<void> {
    return this.connection.sendNotification('textDocument/didClose', { textDocument: { uri } });
  }

  hover(uri: string, position: Position): Promise<Hover | null> {
    return this.connection.sendRequest('textDocument/hover', { textDocument: { uri }, position });
  }

  actions(uri: string, range: Range, diagnostics: readonly Diagnostic[] = [], only?: string[]): Promise<CodeAction[]> {
    return this.connection.sendRequest('textDocument/codeAction', { textDocument: { uri }, range, context: { diagnostics, only } });
  }

  /** The first diagnostics of `uri` published from now on, or already, for which `holds` is true. */
  async diagnostics(uri: string, holds: (params: PublishDiagnosticsParams) => boolean = () => true): Promise<Diagnostic[]> {
    for (let seen = 0; ;) {
      for (; seen < this.published.length; seen++) {
        const params = this.published[seen];
        if (params.uri === uri && holds(params)) return params.diagnostics;
      }
      await new Promise<void>(resolve => this.waiting.push(resolve));
    }
  }
  /** The diagnostics of this version of a document of one model once its numbers are known: the second that are published. */
  complete(uri: string, version: number): Promise<Diagnostic[]> {
    let count = 0;
    return this.diagnostics(uri, params => params.version === version && ++count === 2);
  }
}

/** The position of the first `word` in `text`, `shift` characters in. */
export function positionOf(text: string, word: string, shift = 0): Position {
  const lines = text.slice(0, text.indexOf(word) + shift).split('\n');
  return { line: lines.length - 1, character: lines.at(-1)!.length };
}

/** `text` after the edits of an action. */
export function applied(text: string, action: CodeAction): string {
  const lines = text.split('\n');
  const offset = ({ line, character }: Position): number => lines.slice(0, line).join('\n').length + (line > 0 ? 1 : 0) + character;
  const edits = Object.values(action.edit!.changes!).flat();
  const backwards = [...edits].sort((a, b) => offset(b.range.start) - offset(a.range.start));
  return backwards.reduce((all, { range, newText }) => all.slice(0, offset(range.start)) + newText + all.slice(offset(range.end)), text);
}

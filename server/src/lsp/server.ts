import {
  CodeActionKind,
  type Connection,
  DidChangeConfigurationNotification,
  type InitializeParams,
  type InitializeResult,
  MarkupKind,
  MessageType,
  PositionEncodingKind,
  ShowMessageNotification,
  TextDocumentSyncKind,
  TextDocuments,
} from 'vscode-languageserver/node';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { version } from '../../../package.json';
import { fixesAt } from '../features/fixes';
import { hoverAt } from '../features/hover';
import { findingsOf } from '../findings';
import type { CheckedDocument } from '../session/checked';
import { Evaluator } from '../session/evaluator';
import { Scheduler } from '../session/scheduler';
import { readSettings } from '../session/settings';
import { toAction, toDiagnostic, toOffset, toRange, toSpan } from './convert';
import { Progress } from './progress';

export interface ServerPlaces {
  /** Path of the bundled worker. */
  readonly worker: string;
  /** URI of the folder that holds `docs/`, ending in a slash. */
  readonly docs: string;
}

/** Answers the protocol on `connection` until it is closed. */
export function serve(connection: Connection, places: ServerPlaces): void {
  const documents = new TextDocuments(TextDocument);
  const progress = new Progress(connection);
  const client = { images: false, pullsSettings: false, watchesSettings: false, showsProgress: false };

  /** Nothing that goes wrong while a message to the client is prepared or sent may end the server. */
  const logging = async (work: () => Promise<unknown>): Promise<void> => {
    await work().catch((error: unknown) => connection.console.error(String(error)));
  };

  const publish = (uri: string, version: number, checked: CheckedDocument): void => {
    const document = documents.get(uri);
    if (!document || document.version !== version) return;
    void logging(async () => {
      const diagnostics = findingsOf(checked).map(finding => toDiagnostic(document, finding, places.docs));
      await connection.sendDiagnostics({ uri, version, diagnostics });
    });
  };
  const scheduler = new Scheduler(new Evaluator(places.worker), {
    checked: publish,
    working: work => client.showsProgress && progress.show(work),
  });

  const configure = (section: unknown): void => {
    const { settings, complaints } = readSettings(section);
    for (const message of complaints) {
      void logging(() => connection.sendNotification(ShowMessageNotification.type, { type: MessageType.Warning, message }));
    }
    scheduler.configure(settings);
  };
  const pullSettings = (): Promise<void> => logging(async () => configure(await connection.workspace.getConfiguration('tare')));

  connection.onInitialize(({ capabilities, initializationOptions }: InitializeParams): InitializeResult => {
    const wishes = initializationOptions as { images?: unknown; settings?: unknown } | undefined;
    client.images = wishes?.images === true;
    client.pullsSettings = capabilities.workspace?.configuration === true;
    client.watchesSettings = capabilities.workspace?.didChangeConfiguration?.dynamicRegistration === true;
    client.showsProgress = capabilities.window?.workDoneProgress === true;
    if (wishes?.settings !== undefined) configure(wishes.settings);
    return {
      serverInfo: { name: 'tare', version },
      capabilities: {
        positionEncoding: PositionEncodingKind.UTF16,
        textDocumentSync: TextDocumentSyncKind.Incremental,
        hoverProvider: true,
        codeActionProvider: { codeActionKinds: [CodeActionKind.QuickFix] },
      },
    };
  });
  connection.onInitialized(async () => {
    if (client.watchesSettings)
      await logging(() => connection.client.register(DidChangeConfigurationNotification.type, { section: 'tare' }));
    if (client.pullsSettings) await pullSettings();
  });
  connection.onDidChangeConfiguration(({ settings }) =>
    client.pullsSettings ? pullSettings() : configure((settings as { tare?: unknown } | null)?.tare),
  );

  documents.onDidChangeContent(({ document }) => scheduler.update(document.uri, document.version, document.getText()));
  documents.onDidClose(({ document }) => {
    scheduler.close(document.uri);
    void connection.sendDiagnostics({ uri: document.uri, diagnostics: [] });
  });

  connection.onHover(({ textDocument, position }) => {
    const document = documents.get(textDocument.uri);
    const checked = scheduler.current(textDocument.uri);
    if (!document || !checked) return null;
    const hover = hoverAt(checked, toOffset(document, position), { images: client.images });
    return hover && { contents: { kind: MarkupKind.Markdown, value: hover.markdown }, range: toRange(document, hover.span) };
  });
  connection.onCodeAction(({ textDocument, range, context }) => {
    const document = documents.get(textDocument.uri);
    const checked = scheduler.current(textDocument.uri);
    if (!document || !checked || context.only?.some(kind => kind === CodeActionKind.QuickFix || kind === '') === false) return [];
    return fixesAt(checked, toSpan(document, range)).map(({ fix, code }) =>
      toAction(
        document,
        fix,
        context.diagnostics.filter(diagnostic => diagnostic.code === code),
      ),
    );
  });
  connection.onShutdown(() => scheduler.dispose());

  documents.listen(connection);
  connection.listen();
}

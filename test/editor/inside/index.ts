import * as vscode from 'vscode';
import type { ExpectedDiagnostic } from '../machine';

// Runs inside the editor's extension host: every sample shows what the command line reports.

const patience = 60_000;

/** Called by the editor; throws where a sample shows anything else. */
export async function run(): Promise<void> {
  const [folder] = vscode.workspace.workspaceFolders!;
  const bytes = await vscode.workspace.fs.readFile(vscode.Uri.joinPath(folder.uri, 'expected.json'));
  const expected = JSON.parse(new TextDecoder().decode(bytes)) as Record<string, ExpectedDiagnostic[]>;
  const problems: string[] = [];
  for (const [name, findings] of Object.entries(expected)) {
    const difference = await differenceIn(vscode.Uri.joinPath(folder.uri, name), findings);
    console.log(`${difference === null ? 'agrees' : 'DIFFERS'} ${name} (${findings.length} findings)`);
    if (difference !== null) problems.push(`${name}: ${difference}`);
  }
  if (problems.length > 0) throw new Error(problems.join('\n'));
}

/** Opens the file and waits until its diagnostics are those expected; null if they become so. */
async function differenceIn(uri: vscode.Uri, findings: readonly ExpectedDiagnostic[]): Promise<string | null> {
  const document = await vscode.workspace.openTextDocument(uri);
  if (document.languageId !== 'tare') return `its language is ${document.languageId}`;
  await vscode.window.showTextDocument(document);
  const wanted = findings.map(one => asLine(one.code, one.severity, one.range.start, one.range.end, one.message)).sort();
  const shown = (): string[] => vscode.languages.getDiagnostics(uri).map(lineOf).sort();
  const extension = vscode.extensions.getExtension('tare-physics.tare');
  await extension?.activate();
  for (const end = Date.now() + patience; Date.now() < end;) {
    if (extension?.isActive && shown().join('\n') === wanted.join('\n')) return null;
    await new Promise(resolve => setTimeout(resolve, 50));
  }
  return `expected\n  ${wanted.join('\n  ')}\nbut the editor shows\n  ${shown().join('\n  ')}`;
}

function lineOf(diagnostic: vscode.Diagnostic): string {
  const code = typeof diagnostic.code === 'object' ? diagnostic.code.value : diagnostic.code;
  const severity = vscode.DiagnosticSeverity[diagnostic.severity].toLowerCase();
  return asLine(String(code), severity, diagnostic.range.start, diagnostic.range.end, diagnostic.message);
}

const asLine = (code: string, severity: string, start: Place, end: Place, message: string): string =>
  `${start.line}:${start.character}-${end.line}:${end.character} ${severity} ${code} ${message}`;

interface Place {
  readonly line: number;
  readonly character: number;
}

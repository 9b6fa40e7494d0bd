import * as vscode from 'vscode';

/** `diagnostic` with its code leading to the page about it, rendered, rather than to the page's source. */
export function linkToDocs(diagnostic: vscode.Diagnostic): vscode.Diagnostic {
  const { code } = diagnostic;
  if (typeof code === 'object') {
    const argument = encodeURIComponent(JSON.stringify([code.value]));
    diagnostic.code = { value: code.value, target: vscode.Uri.parse(`command:tare.showFindingDocs?${argument}`) };
  }
  return diagnostic;
}

/** Opens the page about findings at the one named. */
export async function showFindingDocs(extension: vscode.Uri, code: string): Promise<void> {
  const page = vscode.Uri.joinPath(extension, 'docs', 'findings.md');
  await vscode.commands.executeCommand('markdown.showPreview', page.with({ fragment: code }));
}

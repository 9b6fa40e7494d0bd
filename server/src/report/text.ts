import type { Severity } from '../findings/finding';
import { counted, listed } from '../findings/words/numbers';
import { type CheckedFile, exitStatus } from './checked-file';
import { harmless } from './columns';
import type { Palette } from './palette';
import { Lines } from './position';
import { findingText, severityWord, styleOf } from './text-finding';
import { modelText } from './text-model';

/** The report for a person: each file with its models and findings, then one line that sums up. Lines of at most `width` columns where words allow it. */
export function textReport(files: readonly CheckedFile[], width: number, palette: Palette): string {
  const blocks = files.flatMap(file => {
    const lines = new Lines(file.text);
    const models = (file.checked?.models ?? []).map(model => modelText(model, width, palette));
    const findings = file.findings.map(finding => findingText(file, lines, finding, width, palette));
    const title = files.length > 1 && models.length > 0 ? [[palette.faint(harmless(file.path))]] : [];
    return [...title, ...models, ...findings];
  });
  return `${[...blocks, [summary(files, palette)]].map(block => block.join('\n')).join('\n\n')}\n`;
}

function summary(files: readonly CheckedFile[], palette: Palette): string {
  const models = files.reduce((sum, { checked }) => sum + (checked?.models.length ?? 0), 0);
  const found = files.flatMap(({ findings }) => findings);
  const counts = (['error', 'warning', 'information', 'hint'] as const satisfies readonly Severity[]).flatMap(severity => {
    const count = found.filter(finding => finding.severity === severity).length;
    return count > 0 ? [styleOf(severity, palette)(counted(count, severityWord[severity]))] : [];
  });
  const verdict = exitStatus(files) === 0 ? [palette.good('finite to the order asked for, and as expected')] : [];
  return `${counted(files.length, 'file')}, ${counted(models, 'model')}: ${[...verdict, ...(counts.length > 0 ? [listed(counts)] : [])].join('; ')}.`;
}

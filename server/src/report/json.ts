import { version } from '../../../package.json';
import type { Finding } from '../findings/finding';
import type { Overrides } from '../language/document';
import type { CheckedModel } from '../session/checked';
import { exitStatus, type CheckedFile } from './checked-file';
import { resultsJson } from './json-results';
import { Lines } from './position';
import { shapeInWords, waveInWords } from './spec-words';

/** The report, format 1, as JSON text: the same bytes for the same input, every number in it finite. */
export function jsonReport(files: readonly CheckedFile[], options: Overrides): string {
  const report = {
    tool: 'tare',
    version,
    format: 1,
    exit: exitStatus(files),
    options: { cutoff: options.cutoff, order: options.order },
    files: files.map(file => ({
      file: file.path,
      ...(file.sha256 !== null && { sha256: file.sha256 }),
      models: file.checked?.models.length ?? 0,
      findings: findingsJson(file, null),
    })),
    models: files.flatMap(file => (file.checked?.models ?? []).map((model, index) => modelJson(file, model, index))),
  };
  return `${JSON.stringify(report, finite, 2)}\n`;
}

/** JSON has no infinities: a number that is none is one the tool could not tell. */
const finite = (_: string, value: unknown): unknown => (typeof value === 'number' && !Number.isFinite(value) ? null : value);

function modelJson(file: CheckedFile, { source, results }: CheckedModel, index: number): object {
  const { spec, name } = source;
  const about = spec && {
    dimension: spec.dimension,
    wave: waveInWords(spec.wave, spec.dimension),
    ...(spec.units && { units: { energy: spec.units.energy, length: spec.units.length } }),
    cutoff: {
      name: spec.cutoff.name,
      value: spec.cutoff.value,
      shape: shapeInWords(spec.cutoff.shape),
      declared: spec.cutoff.declared,
      ...(spec.cutoff.scan && { scan: [spec.cutoff.scan.from, spec.cutoff.scan.to] }),
    },
    order: spec.series.order,
    orderDeclared: spec.series.declared,
  };
  return { model: name, file: file.path, ...about, ...resultsJson(results), findings: findingsJson(file, index) };
}

/** The findings of the model at `index`, or those outside any model. Two models of one name (a mistake) are told apart by place. */
function findingsJson(file: CheckedFile, index: number | null): object[] {
  const lines = new Lines(file.text);
  return file.findings.filter(finding => modelIndexOf(file, finding) === index).map(finding => findingJson(file.path, lines, finding));
}

function modelIndexOf({ checked }: CheckedFile, { model, span }: Finding): number | null {
  if (model === null || !checked) return null;
  const named = checked.models.flatMap(({ source }, index) => (source.name === model ? [index] : []));
  const around = named.find(
    index => checked.models[index].source.places.model.start <= span.start && span.start <= checked.models[index].source.places.model.end,
  );
  return around ?? named[0] ?? null;
}

function findingJson(path: string, lines: Lines, finding: Finding): object {
  const { code, severity, message, span, subject, p, related, docs, fixes } = finding;
  return {
    code,
    severity,
    message,
    file: path,
    range: lines.range(span),
    ...(subject !== undefined && { subject }),
    ...(p !== undefined && { p }),
    ...(related.length > 0 && { related: related.map(other => ({ file: path, range: lines.range(other.span), message: other.message })) }),
    docs,
    ...(fixes.length > 0 && { fixes: fixes.map(({ title }) => title) }),
  };
}

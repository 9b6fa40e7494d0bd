import type { ModelBlock, Statement } from '../outline';

/** The first model of each name. */
export type ModelsByName = ReadonlyMap<string, ModelBlock>;

export function modelsByName(models: readonly ModelBlock[]): ModelsByName {
  const byName = new Map<string, ModelBlock>();
  for (const model of models) if (!byName.has(model.name.name)) byName.set(model.name.name, model);
  return byName;
}

/** A model, the one it varies, and so on; how that ends: at a model that varies none, at an unknown one, or never. */
export interface Lineage {
  readonly blocks: readonly ModelBlock[];
  readonly end: 'model' | 'unknown' | 'circle';
}

/** Variants of variants: enough for anyone. */
export const longestLineage = 100;

export function lineageOf(block: ModelBlock, models: ModelsByName): Lineage {
  const blocks = [block];
  for (let last = block; last.from !== null;) {
    const base = models.get(last.from.name);
    if (base === undefined) return { blocks, end: 'unknown' };
    if (blocks.includes(base) || blocks.length > longestLineage) return { blocks, end: 'circle' };
    blocks.push(base);
    last = base;
  }
  return { blocks, end: 'model' };
}

/** The statements that a model has in the end. */
export const mergeLineage = ({ blocks, end }: Lineage): ModelBlock =>
  end === 'model' ? blocks.reduceRight((base, variant) => merge(base, variant)) : blocks[0];

/**
 * The statements of a model that varies another: those of `base`, each replaced in its place where `variant` has one of the same kind
 * and name, added to otherwise.
 */
function merge(base: ModelBlock, variant: ModelBlock): ModelBlock {
  const replacing = new Map(variant.statements.map(statement => [key(statement), statement]));
  const expects = variant.statements.some(statement => statement.word === 'expect');
  const used = new Set<Statement>();
  const statements: Statement[] = [];
  for (const statement of base.statements) {
    if (expects && statement.word === 'expect') continue;
    const replacement = replacing.get(key(statement));
    if (replacement === undefined || statement.word === 'expect') statements.push(statement);
    else if (!used.has(replacement)) {
      statements.push(replacement);
      used.add(replacement);
    }
  }
  statements.push(...variant.statements.filter(statement => !used.has(statement)));
  return { ...variant, statements, broken: [...base.broken, ...variant.broken] };
}

/** Two statements with the same key replace each other: what stands at most once by its kind, the others by kind and name. */
function key({ body, span }: Statement): string {
  switch (body.kind) {
    case 'const':
    case 'coupling':
    case 'counterterm':
    case 'fix':
    case 'data':
      return `${body.kind} ${body.name.name}`;
    case 'interaction': {
      const { element } = body.kernel;
      return `interaction ${body.name.name}${element === null ? '' : `[${element.out.value}, ${element.in.value}]`}`;
    }
    case 'expect':
      return `expect ${span.start}`;
    default:
      return body.kind;
  }
}

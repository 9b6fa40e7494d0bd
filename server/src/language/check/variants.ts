import type { ModelBlock, Statement } from '../outline';

/**
 * The statements of a model that varies another: those of `base`, each replaced in its place where `variant` has one of the same kind
 * and name, added to otherwise.
 */
export function merge(base: ModelBlock, variant: ModelBlock): ModelBlock {
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

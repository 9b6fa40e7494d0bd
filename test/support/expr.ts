import { parse } from 'mathjs';
import type { MathNode } from 'mathjs';
import { binary, call, negate, number, symbol } from '../../server/src/core/algebra/expression';
import type { Expr, FunctionName } from '../../server/src/core/algebra/expression';

const OPERATORS = { add: 'add', subtract: 'subtract', multiply: 'multiply', divide: 'divide', pow: 'power' } as const;

/** An expression for tests of the core, read by mathjs so that they do not lean on the language's own parser. `delta1(x)` is delta'(x). */
export function expr(text: string): Expr {
  return convert(parse(text));
}

function convert(node: MathNode): Expr {
  const n = node as unknown as {
    type: string;
    value: number;
    name: string;
    fn: string & { name: string };
    args: MathNode[];
    content: MathNode;
  };
  switch (n.type) {
    case 'ConstantNode':
      return number(n.value);
    case 'SymbolNode':
      return n.name === 'i' ? number(0, 1) : n.name === 'pi' ? number(Math.PI) : symbol(n.name);
    case 'ParenthesisNode':
      return convert(n.content);
    case 'OperatorNode': {
      const args = n.args.map(convert);
      if (n.fn === 'unaryMinus') return negate(args[0]);
      return binary(OPERATORS[n.fn as string as keyof typeof OPERATORS], args[0], args[1]);
    }
    default: {
      const primes = /^delta(\d)$/.exec(n.fn.name);
      return call((primes ? 'delta' : n.fn.name) as FunctionName, n.args.map(convert), primes ? Number(primes[1]) : 0);
    }
  }
}

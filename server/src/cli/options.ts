import { InvalidArgumentError } from 'commander';
import { highestOrder } from '../language/document';

const decimal = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/** `--cutoff`: a momentum above 0, in each model's own unit. */
export function readCutoff(text: string): number {
  const value = Number(text);
  if (!decimal.test(text)) throw new InvalidArgumentError("Write a number such as 40, in each model's own unit of momentum.");
  if (!Number.isFinite(value)) throw new InvalidArgumentError('The number is too large.');
  if (!(value > 0)) throw new InvalidArgumentError('A cutoff is a momentum above 0.');
  return value;
}

/** `--order`: a whole number from 1 to `highestOrder`. */
export function readOrder(text: string): number {
  const value = Number(text);
  if (!/^\d+$/.test(text) || value < 1 || value > highestOrder)
    throw new InvalidArgumentError(`Write a whole number from 1 to ${highestOrder}.`);
  return value;
}

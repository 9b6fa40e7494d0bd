import { InvalidArgumentError } from 'commander';

const decimal = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/** The highest order that may be asked for: above it the number of monomials grows beyond what a person can read. */
export const highestOrder = 12;

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

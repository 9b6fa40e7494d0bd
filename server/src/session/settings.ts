import { highestOrder, type Defaults } from '../language/document';

/** What holds for a model that declares no cutoff or series, where neither the editor's settings nor the command line say otherwise. */
export const standardDefaults: Defaults = { cutoff: 10, order: 3 };

export interface Settings {
  readonly defaults: Defaults;
  /** Evaluations of kernels that one model may cost after a keystroke. */
  readonly keystrokeBudget: number;
}

export const standardSettings: Settings = { defaults: standardDefaults, keystrokeBudget: 5e9 };

/**
 * Settings from what an editor sent, which may be anything: what is missing or makes no sense is taken from `standardSettings`.
 * `complaints` says which settings were not taken, in a sentence each.
 */
export function readSettings(section: unknown): { readonly settings: Settings; readonly complaints: readonly string[] } {
  const given: Record<string, unknown> = typeof section === 'object' && section !== null ? { ...section } : {};
  const complaints: string[] = [];
  const take = (name: string, standard: number, isGood: (value: number) => boolean, wanted: string): number => {
    const value = given[name];
    if (value === undefined || value === null) return standard;
    if (typeof value === 'number' && Number.isFinite(value) && isGood(value)) return value;
    complaints.push(`tare.${name} is ${JSON.stringify(value)}, but it must be ${wanted}; ${standard} is used.`);
    return standard;
  };
  const settings = {
    defaults: {
      cutoff: take('cutoff', standardDefaults.cutoff, x => x > 0, 'a momentum above 0'),
      order: take(
        'order',
        standardDefaults.order,
        x => Number.isInteger(x) && x >= 1 && x <= highestOrder,
        `a whole number from 1 to ${highestOrder}`,
      ),
    },
    keystrokeBudget: take('keystrokeBudget', standardSettings.keystrokeBudget, x => x > 0, 'a number of evaluations above 0'),
  };
  return { settings, complaints };
}

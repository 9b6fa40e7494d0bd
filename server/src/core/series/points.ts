import type { SeriesSpec } from '../model/spec';
import type { Remark } from '../results';
import type { OnShellPoint } from './amplitudes';
import type { Setup } from './setup';

type Asked = SeriesSpec['points'][number];

/** The on-shell momenta of a model: those of its series first (`reported` of them), then what its expectations ask for. */
export interface AskedPoints {
  readonly points: readonly OnShellPoint[];
  readonly reported: number;
  readonly remarks: readonly Remark[];
  /** The (first) on-shell momentum of what was asked. */
  find(asked: Asked): OnShellPoint | null;
}

export function onShellPoints(setup: Setup): AskedPoints {
  const { spec, kinematics, regulator } = setup;
  const points: OnShellPoint[] = [];
  const remarks: Remark[] = [];
  const byAsked = new Map<string, OnShellPoint | null>();
  const keyOf = (asked: Asked) => `${asked.p}/${asked.E}`;
  const add = (asked: Asked, subject: string | null): void => {
    if (byAsked.has(keyOf(asked))) return;
    const roots =
      asked.p !== null
        ? [asked.p]
        : kinematics
            .roots(asked.E!)
            .map(r => r.p)
            .filter(p => p > 0);
    const usable = roots.filter(p => {
      const reason = reasonAgainst(setup, p, regulator.shape.kind === 'sharp');
      if (reason) remarks.push({ ...reason, subject, p });
      return !reason;
    });
    if (!roots.length) {
      remarks.push({
        code: 'not-evaluated',
        subject,
        message: `The energy ${asked.E} lies below threshold, where there is no on-shell momentum: this version evaluates amplitudes above threshold.`,
      });
    }
    const found = usable.map(p => ({ p, E: kinematics.energy(p) }));
    points.push(...found);
    byAsked.set(keyOf(asked), found[0] ?? null);
  };
  spec.series.points.forEach(asked => add(asked, 'series'));
  const reported = points.length;
  for (const e of spec.expectations) if (e.kind !== 'finite' && e.point) add(e.point, null);
  return { points, reported, remarks, find: asked => byAsked.get(keyOf(asked)) ?? null };
}

function reasonAgainst({ spec, kinematics }: Setup, p: number, sharp: boolean): Pick<Remark, 'code' | 'message'> | null {
  if (sharp && p >= spec.cutoff.value) {
    return {
      code: 'value',
      message: `The momentum ${p} is not below the cutoff ${spec.cutoff.name} = ${spec.cutoff.value}: the propagator has no pole there. Lower the momentum or raise the cutoff.`,
    };
  }
  if (p === 0 && spec.dimension < 3) {
    return {
      code: 'infrared-divergence',
      message: 'At p = 0 every order of the series diverges at threshold in one and two dimensions: ask for p > 0.',
    };
  }
  return Number.isFinite(kinematics.energy(p))
    ? null
    : { code: 'value', message: `The kinetic energy is not a finite number at p = ${p}.` };
}

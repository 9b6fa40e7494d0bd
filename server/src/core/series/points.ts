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
  const { spec, regulator } = setup;
  const points: OnShellPoint[] = [];
  const remarks: Remark[] = [];
  const byAsked = new Map<string, OnShellPoint | null>();
  const keyOf = (asked: Asked) => `${asked.p}/${asked.E}`;
  const add = (asked: Asked, subject: string | null): void => {
    if (byAsked.has(keyOf(asked))) return;
    const found = pointsOf(setup, asked).filter(({ p }) => {
      const reason = reasonAgainst(setup, p, regulator.shape.kind === 'sharp');
      if (reason) remarks.push({ ...reason, subject, p });
      return !reason;
    });
    points.push(...found);
    byAsked.set(keyOf(asked), found[0] ?? null);
  };
  spec.series.points.forEach(asked => add(asked, 'series'));
  const reported = points.length;
  for (const e of spec.expectations) if (e.kind !== 'finite' && e.point) add(e.point, null);
  return { points, reported, remarks, find: asked => byAsked.get(keyOf(asked)) ?? null };
}

/** At an energy below threshold T(κ, κ; E), κ the momentum whose energy lies as far above it. */
function pointsOf({ kinematics }: Setup, { p, E }: Asked): OnShellPoint[] {
  if (p !== null) return [{ p, E: kinematics.energy(p) }];
  const momentaAt = (energy: number) =>
    kinematics
      .roots(energy)
      .map(root => root.p)
      .filter(k => k > 0);
  const onShell = momentaAt(E!);
  if (onShell.length || E! >= kinematics.threshold) return onShell.map(k => ({ p: k, E: kinematics.energy(k) }));
  return momentaAt(2 * kinematics.threshold - E!).map(k => ({ p: k, E: E!, below: true }));
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

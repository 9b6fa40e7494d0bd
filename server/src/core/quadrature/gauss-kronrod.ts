/** Nodes x >= 0 of the 21-point Kronrod rule and its weights; every second one, from the second on, belongs to the 10-point Gauss rule (QUADPACK, 1983). */
const NODES = [
  0.995657163025808080735527280689003, 0.973906528517171720077964012084452, 0.930157491355708226001207180059508,
  0.865063366688984510732096688423493, 0.780817726586416897063717578345042, 0.679409568299024406234327365114874,
  0.562757134668604683339000099272694, 0.433395394129247190799265943165784, 0.294392862701460198131126603103866,
  0.14887433898163121088482600112972, 0,
];
const KRONROD = [
  0.011694638867371874278064396062192, 0.03255816230796472747881897245939, 0.05475589657435199603138130024458,
  0.07503967481091995276704314091619, 0.093125454583697605535065465083366, 0.109387158802297641899210590325805,
  0.123491976262065851077958109585166, 0.134709217311473325928054001771707, 0.142775938577060080797094273138717,
  0.147739104901338491374841515972068, 0.149445554002916905664936468389821,
];
const GAUSS = [
  0.066671344308688137593568809893332, 0.149451349150580593145863396957697, 0.219086362515982043995534934228163,
  0.269266719309996355091226921569469, 0.295524224714752870173815619188769,
];

export const KRONROD_POINTS = 21;

export interface Estimate {
  readonly value: number;
  readonly error: number;
  readonly abs: number;
}

/** ∫f over [from, to] by the 21-point rule; the error by QUADPACK's formula, from the difference to the Gauss rule. */
export function kronrod(f: (x: number) => number, from: number, to: number): Estimate {
  const half = (to - from) / 2;
  const middle = (to + from) / 2;
  const values: number[] = [];
  const centre = f(middle);
  let value = KRONROD[10] * centre;
  let abs = KRONROD[10] * Math.abs(centre);
  let gauss = 0;
  for (let i = 0; i < 10; i++) {
    const left = f(middle - half * NODES[i]);
    const right = f(middle + half * NODES[i]);
    values.push(left, right);
    value += KRONROD[i] * (left + right);
    abs += KRONROD[i] * (Math.abs(left) + Math.abs(right));
    if (i % 2 === 1) gauss += GAUSS[(i - 1) / 2] * (left + right);
  }
  let spread = KRONROD[10] * Math.abs(centre - value / 2);
  for (let i = 0; i < 20; i++) spread += KRONROD[i >> 1] * Math.abs(values[i] - value / 2);
  const size = Math.abs(half);
  let error = Math.abs(value - gauss) * size;
  spread *= size;
  if (spread > 0 && error > 0) error = spread * Math.min(1, Math.pow((200 * error) / spread, 1.5));
  return { value: value * half, error: Math.max(error, 1e-15 * abs * size), abs: abs * size };
}

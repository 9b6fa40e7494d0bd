import type { Vertex } from '../model/vertex';
import type { LocalForm } from './forms';

/** A local form as a vertex. */
export function formVertex(form: LocalForm): Vertex {
  return {
    name: form.text,
    contact: form.terms,
    finiteRank: form.terms.map(t => ({ ...t, phase: 0 })),
    ridge: Infinity,
    dependsOnEnergy: form.terms.some(t => t.e > 0),
    element: {
      symmetric: false,
      real: form.terms.every(t => t.im === 0),
      relativeError: 1e-15,
      shape: { kind: 'polynomial', terms: form.terms },
      fill(p, k, E, re, im) {
        re.fill(0);
        im.fill(0);
        for (const t of form.terms) {
          for (let j = 0; j < p.length; j++) {
            const v = p[j] ** t.a * k[j] ** t.b * E ** t.e;
            re[j] += t.re * v;
            im[j] += t.im * v;
          }
        }
      },
    },
  };
}

import type { RawTensor } from './raw-tensor.ts';
import { fromSix, usualOrder } from './row-finder.ts';
import type { ComponentOrder } from '#src/tensor/text-choice.ts';
import { factsOf, proves, traceShare } from './tensor-proof.ts';
import type { Topic } from './topic.ts';

/** Orders in which six components are printed, as places 0 to 8. */
export const sixOrders: readonly (readonly [Exclude<ComponentOrder, 'exchanged'>, readonly number[]])[] = [
  ['xx yy zz xy xz yz', usualOrder],
  ['xx yy zz yz xz xy', [0, 4, 8, 5, 2, 1]],
  ['xx yy zz xy yz xz', [0, 4, 8, 1, 5, 2]],
  ['xx xy xz yy yz zz', [0, 1, 2, 4, 5, 8]],
  ['xx xy yy xz yz zz', [0, 1, 4, 2, 5, 8]],
];

/** The order in which a group prints six numbers, and how it is known. */
export interface SixOrder {
  readonly order: readonly number[];
  readonly evidence: string;
  /** False where values printed beside the tensors, or words, do not settle it. */
  readonly isProved: boolean;
}

/** The order of six numbers on a row: as a line above names it, else the one that printed values and the trace agree with. */
export function sixOrder(tensors: readonly RawTensor[], topic: Topic): SixOrder {
  if (topic.order !== null) {
    return {
      order: topic.order.value,
      evidence: `order of components from line ${topic.order.line}`,
      isProved: true,
    };
  }
  const sample = tensors.slice(0, 200);
  const scored = sixOrders.map(([name, order]) => {
    let proofs = 0;
    let traces = 0;
    for (const { sixes, printed, digits } of sample) {
      const values = fromSix(sixes ?? [], order);
      const facts = factsOf(values);
      if (facts === null) continue;
      for (const value of printed) if (proves(value, facts, digits)) proofs++;
      if ((traceShare(values, digits) ?? 1) < 1e-3) traces++;
    }
    return { name, order, score: proofs * 2 + (traces === sample.length ? 1 : 0), proofs };
  });
  const best = scored.reduce((most, one) => (one.score > most.score ? one : most));
  const rivals = scored.filter(({ score }) => score === best.score);
  if (best.score === 0) {
    return {
      order: usualOrder,
      evidence: 'order xx yy zz xy xz yz assumed: nothing in the text proves it',
      isProved: false,
    };
  }
  return rivals.length === 1
    ? {
        order: best.order,
        evidence: `order ${best.name}, proved by values printed with the tensors`,
        isProved: true,
      }
    : {
        order: best.order,
        evidence: `order ${best.name} assumed: the trace leaves ${rivals.map(({ name }) => name).join(' or ')}`,
        isProved: false,
      };
}

import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { evaluate } from '../../../lib/answers/evaluate.js';
import { predict } from '../../../lib/answers/predict.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../lib/constants/defining-constants.js';
import { expectWithin } from '../../expect-within.js';

const campaign = readCampaign(
  readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8'),
).campaign;

describe('evaluate, in lengths', () => {
  const evaluation = evaluate(campaign);
  const prediction = predict(campaign);

  it('the residual as length equivalent: its y times the c²/ḡ that turns the link’s ΔW into its length', () => {
    for (const link of evaluation.links) {
      const { dW, dH } = prediction.links.find(({ id }) => id === link.id)!;
      const perLength = (SPEED_OF_LIGHT_SQUARED_M2_PER_S2 * dH!.value) / dW!.value;
      expectWithin(link.residualLength!.value, link.residual!.value * perLength, 1e-12);
      expectWithin(link.residualLength!.u, link.residual!.u * perLength, 1e-12);
      // 2.801585 times u would have shown (test size 0.05, power 0.8)
      expectWithin(link.smallestDetectableM!, 2.801585 * link.residualLength!.u, 1e-7);
      expectWithin(link.effectOffset!, evaluation.effectM! / perLength, 1e-30);
    }
  });

  it('what unlike transitions add is the difference of predicted and gravity’s y; none between equal ones', () => {
    for (const link of evaluation.links) {
      const { y } = prediction.links.find(({ id }) => id === link.id)!;
      expectWithin(link.predicted!.value - y!.value, link.ratioOffset?.value ?? 0, 1e-27);
    }
    // the file states 171Yb as 2.1(7)e-17 beside 87Sr; rp goes to ytterbium, hr stays with strontium
    const rp = evaluation.links.find(({ id }) => id === 'rp')!;
    expectWithin(rp.ratioOffset!.value, 2.1e-17, 1e-24);
    expectWithin(rp.ratioOffset!.u, 7e-18, 1e-24);
    expect(evaluation.links.find(({ id }) => id === 'hr')!.ratioOffset).toBe(null);
  });

  it('the effect is ten times the target where only that is stated, and null without either', () => {
    expectWithin(evaluate({ ...campaign, effectM: null, targetM: 0.02 }).effectM!, 0.2, 1e-15);
    const none = evaluate({ ...campaign, effectM: null, targetM: null });
    expect(none.effectM).toBe(null);
    expect(none.links.map(({ effectOffset }) => effectOffset)).toEqual(none.links.map(() => null));
  });
});

import { expect } from '@open-wc/testing';
import { RESULTS, runEverywhere, SUM_OF_DRAWS, sumOfDraws } from '../lib/uncertainty/monte-carlo/same-everywhere.js';

describe('Monte Carlo engine in a browser', () => {
  it('draws bit for bit what Node draws', () => {
    expect(sumOfDraws()).to.equal(SUM_OF_DRAWS);
  });

  it('gives the results of Node to 12 digits', () => {
    const found = runEverywhere();
    expect(found.length).to.equal(RESULTS.length);
    for (const [i, value] of found.entries()) expect(Math.abs(value / RESULTS[i]! - 1)).to.be.at.most(1e-12);
  });
});

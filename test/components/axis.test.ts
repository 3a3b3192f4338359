import { expect } from '@open-wc/testing';
import {
  cutToFrame,
  downToOneThree,
  linearAxis,
  logAxis,
  logTicks,
  pathOf,
  tickLabel,
  upToOneThree,
} from '../../components/charts/axis.js';

describe('axis', () => {
  it('maps decades to equal lengths, either way round', () => {
    const x = logAxis(0.01, 100, 50, 650);
    expect([0.01, 0.1, 1, 100].map((v) => Math.round(x.at(v)))).to.deep.equal([50, 200, 350, 650]);
    const y = logAxis(1, 1000, 300, 0);
    expect(Math.round(y.at(10))).to.equal(200);
    expect(linearAxis(-10, 10, 0, 100).at(5)).to.equal(75);
  });

  it('has ticks of both ends, without the dust of multiplication', () => {
    expect(logTicks(0.01, 1, [1, 3])).to.deep.equal([0.01, 0.03, 0.1, 0.3, 1]);
    expect(logTicks(0.02, 0.25, [1, 3])).to.deep.equal([0.03, 0.1]);
    expect(logTicks(10, 100, [2, 5])).to.deep.equal([20, 50]);
    expect([0.3, 30, 1e4].map(tickLabel)).to.deep.equal(['0.3', '30', '10000']);
  });

  it('rounds down and up to 1 or 3', () => {
    expect([0.9, 1, 2.9, 3, 31].map(downToOneThree)).to.deep.equal([0.3, 1, 1, 3, 30]);
    expect([0.9, 1, 2.9, 3, 31].map(upToOneThree)).to.deep.equal([1, 1, 3, 3, 100]);
  });

  it('cuts a line at the frame, where it crosses it', () => {
    const cut = cutToFrame(
      [
        [0, -10],
        [10, 10],
        [20, 10],
        [30, 50],
      ],
      0,
      30,
    );
    expect(cut).to.deep.equal([[5, 0], [10, 10], [20, 10], [25, 30], null]);
    expect(pathOf(cut)).to.equal('M5.0 0.0L10.0 10.0L20.0 10.0L25.0 30.0');
    expect(pathOf([[0, 0], [1, 1], null, [2, 2], [3, 3]])).to.equal('M0.0 0.0L1.0 1.0M2.0 2.0L3.0 3.0');
  });
});

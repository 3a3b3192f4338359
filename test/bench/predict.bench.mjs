// How long a campaign takes from its text to its prediction. No other program is known that answers the same question.
import { performance } from 'node:perf_hooks';
import { predict, readCampaign } from '../../dist/index.js';

export const name = 'campaign';

/** A chain of sites with GNSS and quasigeoid, levelling at every fifth, shared sources throughout. */
function chain(siteCount, linkCount) {
  const ids = Array.from({ length: siteCount }, (_, i) => `s${i}`);
  return JSON.stringify({
    format: 'plumbtick-campaign/1',
    sources: [{ id: 'gnss', correlation: 0.3 }, { id: 'quasigeoid', correlationLength: '80 km' }, { id: 'levelling' }],
    datums: [{ id: 'd', W0: { value: '62636853.0(5) m²/s²', tide: 'mean' } }],
    sites: ids.map((id, i) => ({
      id,
      lat: 45 + (i % 40) * 0.2,
      lon: 5 + Math.floor(i / 40) * 0.3,
      g: '9.8070000(30) m/s²',
      h: { value: `${100 + i}.000(8) m`, tide: 'free', source: 'gnss' },
      determinations: [
        { kind: 'gnss-quasigeoid', zeta: { value: '45.000(20) m', tide: 'zero', source: 'quasigeoid' } },
        ...(i % 5 === 0
          ? [
              {
                kind: 'normal-height',
                datum: 'd',
                H: { value: `${55 + i}.000(30) m`, tide: 'mean', source: 'levelling' },
              },
            ]
          : []),
      ],
    })),
    clocks: ids.map((id) => ({ id: `c-${id}`, site: id, transition: '87Sr', tie: [{ dH: '1.200(1) m' }] })),
    links: Array.from({ length: linkCount }, (_, i) => ({
      id: `l${i}`,
      from: `c-s${i % siteCount}`,
      to: `c-s${(i + 1 + Math.floor(i / siteCount)) % siteCount}`,
    })),
  });
}

/** Median of several runs, ms. */
function median(run, times) {
  const each = Array.from({ length: times }, () => {
    const started = performance.now();
    run();
    return performance.now() - started;
  }).sort((a, b) => a - b);
  return each[Math.floor(times / 2)];
}

const ms = (value) => `${value.toPrecision(3)} ms`;
const row = (label, value) => ({ case: label, ours: ms(value), reference: null, ratio: null, note: '' });

export function run() {
  const rows = [];
  for (const [sites, links] of [
    [2, 1],
    [50, 200],
    [200, 199],
  ]) {
    const text = chain(sites, links);
    const { campaign } = readCampaign(text);
    const label = `${sites} sites, ${links} ${links === 1 ? 'link' : 'links'}`;
    rows.push(
      row(
        `read ${label}`,
        median(() => readCampaign(text), 7),
      ),
    );
    const started = performance.now();
    predict(campaign);
    rows.push(row(`predict ${label}, first time`, performance.now() - started));
    rows.push(
      row(
        `predict ${label}, again`,
        median(() => predict(campaign), 7),
      ),
    );
  }
  return rows;
}

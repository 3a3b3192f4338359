import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { whiteFm } from '../lib/clocks/simulated-noise.js';
import { file, plumbtick } from './run-cli.js';

const EXAMPLE = new URL('../../sites/two-institutes-and-a-summit.json', import.meta.url);

describe('plumbtick evaluate with a series beside the campaign', () => {
  it('compares its mean with the prediction and says what the mean rests on', () => {
    const noise = whiteFm(100, 1e-17, 3);
    const rows = [...noise].map((n, i) => `${(61655 + i / 144).toFixed(8)} ${(3.6401e-14 + n).toExponential(12)}`);
    file('link-mo.txt', `${rows.join('\n')}\n`);
    const campaign = JSON.parse(readFileSync(EXAMPLE, 'utf8'));
    campaign.measurements = [{ link: 'mo', series: 'link-mo.txt' }];
    const { status, stdout, stderr } = plumbtick(['evaluate', file('with-series.json', campaign), '--json']);
    expect(stderr).toBe('');
    expect(status).toBe(0);
    const { links, warnings } = JSON.parse(stdout);
    // white noise over a hundred samples leaves 1e-18, the tide between the sites is less
    expect(Math.abs(links[0].measured.value - 3.6401e-14)).toBeLessThan(4e-18);
    expect(links[0].verdict).toMatch(/agree|differ|inconclusive/);
    const note = warnings.find((w: { code: string }) => w.code === 'series-reduced');
    expect(note.message).toContain('100 samples of link-mo.txt');
  });

  it('names the place in the campaign when the file is not there', () => {
    const campaign = JSON.parse(readFileSync(EXAMPLE, 'utf8'));
    campaign.measurements = [{ link: 'mo', series: 'nowhere.txt' }];
    const { status, stdout, stderr } = plumbtick(['evaluate', file('without-series.json', campaign)]);
    expect(status).toBe(1);
    expect(stdout).toBe('');
    expect(stderr).toMatch(/measurements\.0\.series.*nowhere\.txt/s);
  });
});

import { describe, expect, it } from 'vitest';
import { readFloorsOptions } from '../../../lib/answers/floors-options.js';

const good = { dh: '12.348(3) m', g: '9.8125(1) m/s²' };
const faults = (texts: Record<string, string | null>, transitions?: readonly string[]) => {
  const reading = readFloorsOptions(texts, transitions);
  return reading.ok ? [] : reading.faults.map(({ path, code }) => `${path} ${code}`);
};

describe('options of the inter-floor check', () => {
  it('reads what a page holds, line breaks of the source included', () => {
    expect(
      readFloorsOptions({ ...good, dh: '\n  12.348(3)\n', measured: '1.3493(8)e-15', gradient: '2.95(10)e-6 s⁻²' }),
    ).toMatchObject({
      ok: true,
      input: {
        dHM: { value: 12.348, u: 0.003 },
        gMs2: { value: 9.8125, u: 1e-4 },
        gradientPerS2: { value: 2.95e-6, u: 1e-7 },
        measuredY: { value: 1.3493e-15, u: 8e-19 },
        latitudeRad: null,
        heightM: null,
        transitions: [],
      },
      asGiven: { dh: '12.348(3) m', g: '9.8125(1) m/s²', measured: '1.3493(8)e-15' },
    });
  });

  it('takes g in other units and writes a minus as one', () => {
    const reading = readFloorsOptions({ dh: '-12.348(3) m', g: '981250(10) mGal' });
    expect(reading).toMatchObject({ ok: true, asGiven: { dh: '\u221212.348(3) m' } });
    expect(reading.ok && reading.input.gMs2).toEqual({ value: 9.8125, u: 1e-4 });
  });

  it('knows the recommended frequencies, several where asked for', () => {
    const reading = readFloorsOptions(good, ['87Sr', '171Yb+ E3']);
    expect(reading.ok && reading.input.transitions.map(({ id, frequencyHz }) => [id, frequencyHz.value])).toEqual([
      ['87Sr', 429_228_004_229_872.99],
      ['171Yb+ E3', 642_121_496_772_645.12],
    ]);
    expect(faults(good, ['87Sr', '88St'])).toEqual(['transition unknown-transition']);
    const near = readFloorsOptions({ ...good, transition: '87St' });
    expect(near.ok ? '' : near.faults[0]!.expected).toContain('write 87Sr');
  });

  it('refuses everything at once', () => {
    expect(
      faults({
        dh: '12,348(3) m',
        g: '981 m/s²',
        gradient: '3.086 m',
        measured: '1.3',
        lat: '95',
        height: 'high',
      }).sort(),
    ).toEqual([
      'dh decimal-comma',
      'g out-of-range',
      'gradient wrong-unit',
      'height not-a-number',
      'lat out-of-range',
      'measured out-of-range',
    ]);
  });

  it('says what is missing', () => {
    expect(faults({ g: '9.81' })).toEqual(['dh missing']);
    expect(faults({ dh: '3 m' })).toEqual(['g missing']);
    expect(faults({ dh: '3 m', lat: '52' })).toEqual(['height missing']);
    expect(faults({ dh: '3 m', height: '52 m' })).toEqual(['lat missing']);
    expect(faults({ dh: '3 m', lat: '52', height: '80' })).toEqual([]);
    expect(faults({ dh: ' ', g: '9.81' })).toEqual(['dh missing']);
  });
});

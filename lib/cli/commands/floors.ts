import { floors as floorsAnswer } from '../../answers/floors.js';
import { readFloorsOptions } from '../../answers/floors-options.js';
import { floorsReport } from '../../report/index.js';
import type { Command } from '../command.js';
import { refuseOptions } from '../refuse-options.js';

export const floors: Command = {
  name: 'floors',
  summary: 'the offset between clocks on two floors of a house; no file needed',
  synopsis: '--dH LENGTH (--g ACCELERATION | --lat DEGREES --height LENGTH) [more options]',
  takesFile: false,
  description: [
    'The inter-floor check: y = (g·Δ − ½·Γ·Δ²)/c², with Δ the height of the second clock over the first, g the gravity at the lower floor and Γ its decrease with height.',
    'Without a measured g, latitude and height give the normal gravity with its uncertainty, which is good to 1e-19 over a few floors.',
  ],
  options: {
    dH: { value: 'LENGTH', help: 'height difference of the clocks, positive upward: "12.348(3) m"' },
    g: { value: 'ACCELERATION', help: 'gravity at the lower floor: "9.8125(1) m/s²"' },
    lat: { value: 'DEGREES', help: "latitude, instead of g: 52.3 or 52°18'N" },
    height: { value: 'LENGTH', help: 'height of the lower floor, instead of g: "80 m"' },
    gradient: { value: 'GRADIENT', help: 'decrease of g with height; 3.086(31)e-6 s⁻² if not given' },
    transition: { value: 'NAME', help: 'offset in hertz for this transition, 87Sr for example', repeatable: true },
    measured: { value: 'Y', help: 'a measured offset to compare: "1.35(2)e-15"' },
  },
  examples: [
    'plumbtick floors --dH "12.348(3) m" --g "9.8125(1) m/s²" --transition 87Sr',
    'plumbtick floors --dH "-3.21(1) m" --lat 52.3 --height "80 m"',
  ],
  run(call) {
    const texts = Object.fromEntries(
      ['g', 'lat', 'height', 'gradient', 'measured'].map((name) => [name, call.option(name)]),
    );
    const read = readFloorsOptions({ ...texts, dh: call.option('dH') }, call.values('transition'));
    if (!read.ok) return refuseOptions('floors', read.faults, { dh: 'dH' });
    const answer = floorsAnswer(read.input);
    return { kind: 'answer', status: 0, json: answer, report: () => floorsReport(answer, call.provenance) };
  },
};

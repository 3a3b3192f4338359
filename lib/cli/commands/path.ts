import { path as pathAnswer } from '../../answers/path.js';
import { pathReport } from '../../report/path-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';

export const path: Command = {
  name: 'path',
  summary: 'for links that carry time: Sagnac and gravitational delays, and the time a carried clock gains',
  synopsis: 'FILE [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'For every link the delay that the rotation of the Earth makes, 2ωA/c², one way and what stays of it in a two-way comparison; over a satellite also the delay by gravity. The way is the geodesic between the sites, or goes over the points of the link’s "route": {"via": [{"lat", "lon", "height"}]}; a point above 100 km is a satellite.',
    'With "departure" and "arrival" in the route, and "time" at every way point, the time that a clock carried along it gains on one that stays: by height, by velocity, by rotation.',
  ],
  options: {},
  examples: ['plumbtick path campaign.json', 'plumbtick path campaign.json --json'],
  run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const answer = withWarnings(refuseAt(() => pathAnswer(campaign)));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: () => pathReport(answer, { title, provenance: call.provenance }),
    };
  },
};

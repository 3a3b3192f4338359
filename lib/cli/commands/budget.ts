import { linkQuestions } from '../../answers/questions.js';
import { solveCampaign } from '../../answers/solve-campaign.js';
import { linkUncertainty, whatIf } from '../../answers/what-if.js';
import { readWhatIf } from '../../answers/what-if-text.js';
import { CampaignError } from '../../campaign/fault.js';
import { type BudgetExport, budgetReport } from '../../report/budget-export.js';
import { budgetSvg } from '../../report/budget-export-svg.js';
import { questionsSentences, questionsTables } from '../../report/questions-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Command, UsageError } from '../command.js';
import { refuseOptions } from '../refuse-options.js';

export const budget: Command = {
  name: 'budget',
  summary: 'what limits one link, by source; what would help; what if something were known better',
  synopsis: 'FILE [--link ID] [--what-if CHANGE]… [--svg | --json | --csv | --markdown]',
  takesFile: true,
  description: [
    'The uncertainty of one link on three scales with u, U, k and effective degrees of freedom; every input under the source that it shares with others; what only the comparison with a measurement contains; which single value would help most, whether a gravity visit is needed, how wrong the result would be if a permanent-tide label were wrong.',
    'With --what-if the same once more with something known better or worse, the weights of redundant determinations following. The file stays as it is. A change is PATH=AMOUNT with the path as the budget names it: "sites.ridge.g=5 mGal", "clocks.r1.tie.0.dH=×0.5"; of a source all its inputs, "sources.geoid=1 cm", or its correlation, "sources.gnss.correlation=0.9", "sources.geoid.correlationLength=30 km".',
  ],
  options: {
    link: { value: 'ID', help: 'the link; the first if not given' },
    'what-if': { value: 'CHANGE', help: 'PATH=AMOUNT, a u with its unit or a factor such as ×0.5', repeatable: true },
    svg: { help: 'the figure of the budget, as stated' },
  },
  examples: [
    'plumbtick budget campaign.json --link rp',
    'plumbtick budget campaign.json --what-if "sources.geoid=1 cm"',
    'plumbtick budget campaign.json --svg > budget.svg',
  ],
  run(call) {
    const { campaign, refuseAt, warnings } = readCallCampaign(call);
    const { links } = campaign;
    const id = call.option('link') ?? links[0]?.id;
    const index = links.findIndex((link) => link.id === id);
    if (index < 0)
      throw new UsageError(
        id === undefined
          ? 'budget: the file has no links'
          : `budget: there is no link ${JSON.stringify(id)} in the file. Links: ${links.map((link) => link.id).join(', ')}`,
      );
    const solved = refuseAt(() => solveCampaign(campaign));
    const uncertainty = linkUncertainty(solved, index);
    const questions = linkQuestions(solved, index);
    if (!uncertainty || !questions)
      throw new UsageError(`budget: the ends of link ${id} have no common level, so that it has no prediction`);
    const changes = optionFaults(() => call.values('what-if').flatMap((text) => readWhatIf(text, solved.model)));
    const changed = changes.length > 0 ? optionFaults(() => whatIf(solved, index, changes)!) : null;
    const of: BudgetExport = {
      campaign,
      uncertainty,
      whatIf: changed && { changes, uncertainty: changed },
      trials: null,
      provenance: call.provenance,
    };
    if (call.has('svg')) {
      for (const form of ['json', 'csv', 'markdown', 'mediawiki', 'latex', 'html'])
        if (call.has(form)) throw new UsageError(`budget: only one of --svg and --${form}`);
      return { kind: 'plain', text: budgetSvg(of) };
    }
    return {
      kind: 'answer',
      status: 0,
      json: {
        format: 'plumbtick-budget/1',
        ...uncertainty,
        questions,
        whatIf: changed && { changes, ...changed },
        warnings: [...warnings, ...solved.model.warnings],
      },
      report: (detail) => {
        const report = budgetReport(of, detail);
        return {
          ...report,
          sentences: [...report.sentences, ...questionsSentences(questions, campaign)],
          tables: [...report.tables, ...questionsTables(questions, campaign)],
        };
      },
    };
  },
};

/** A change that can't be read is a fault of the call, not of the file. */
function optionFaults<T>(run: () => T): T {
  try {
    return run();
  } catch (error) {
    if (error instanceof CampaignError)
      refuseOptions('budget', error.faults, Object.fromEntries(error.faults.map(({ path }) => [path, 'what-if'])));
    throw error;
  }
}

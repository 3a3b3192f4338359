import {
  backTo,
  type CampaignFile,
  type Edit,
  EditError,
  edited,
  type History,
  historyOf,
  isObject,
  redone,
  undone,
} from '../../lib/campaign/edit/index.js';
import { CampaignError, type Fault } from '../../lib/campaign/fault.js';
import { readCampaignValue } from '../../lib/campaign/read.js';
import { predictionFor } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';

/** One campaign on the desk: its history, what can be read of it, and the last state that could. */
export interface DeskSession {
  readonly history: History;
  readonly faults: readonly Fault[];
  /** null while the file cannot be read */
  readonly answered: AnsweredCampaign | null;
  readonly lastGood: AnsweredCampaign | null;
}

export const sessionOf = (file: CampaignFile): DeskSession => read(historyOf(file), null);

function read(history: History, lastGood: AnsweredCampaign | null): DeskSession {
  try {
    const { campaign, warnings } = readCampaignValue(history.present);
    const prediction = predictionFor(campaign);
    const answered = { campaign, prediction, warnings: [...warnings, ...prediction.warnings] };
    return { history, faults: [], answered, lastGood: answered };
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    return { history, faults: error.faults, answered: null, lastGood };
  }
}

const changed = (session: DeskSession, history: History): DeskSession =>
  history === session.history ? session : read(history, session.lastGood);

/** Applies an edit; one that does not fit the file is said, never thrown at the reader. */
export function withEdit(
  session: DeskSession,
  edit: Edit,
): { readonly session: DeskSession; readonly refused: string | null } {
  try {
    return { session: changed(session, edited(session.history, edit)), refused: null };
  } catch (error) {
    if (!(error instanceof EditError)) throw error;
    return { session, refused: error.message };
  }
}

export const withUndo = (session: DeskSession): DeskSession => changed(session, undone(session.history));
export const withRedo = (session: DeskSession): DeskSession => changed(session, redone(session.history));
export const withBackTo = (session: DeskSession, position: number): DeskSession =>
  changed(session, backTo(session.history, position));

/** The session that a kept campaign was: its edits done again, so that undo is as it was. */
export function sessionFrom(start: CampaignFile, edits: readonly Edit[]): DeskSession {
  let history = historyOf(start);
  for (const edit of edits) history = edited(history, edit);
  return read(history, null);
}

export const titleOf = (file: CampaignFile): string =>
  isObject(file) && typeof file['title'] === 'string' && file['title'] !== '' ? file['title'] : 'untitled campaign';

/** A campaign with nothing in it. */
export const BLANK: CampaignFile = {
  format: 'plumbtick-campaign/1',
  title: '',
  tide: 'mean',
  sites: [],
  clocks: [],
  links: [],
};

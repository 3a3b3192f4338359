import { applyEdit, type Edit, editWords } from './apply-edit.js';
import type { CampaignFile } from './campaign-file.js';

/** A change that was made, and the file before it. */
export interface Change {
  readonly edit: Edit;
  readonly words: string;
  readonly before: CampaignFile;
}

/** A campaign file under editing: undo and redo without limit. Files share what did not change, so a history is small. */
export interface History {
  readonly present: CampaignFile;
  /** oldest first */
  readonly past: readonly Change[];
  /** next redo last */
  readonly future: readonly Change[];
}

export const historyOf = (file: CampaignFile): History => ({ present: file, past: [], future: [] });

/** Applies an edit; what had been undone is gone then. An edit that changes nothing leaves no trace.
 * @throws {EditError} */
export function edited(history: History, edit: Edit): History {
  const present = applyEdit(history.present, edit);
  if (same(present, history.present)) return history;
  const change = { edit, words: editWords(history.present, edit), before: history.present };
  return { present, past: [...history.past, change], future: [] };
}

/** One step back; the same history where there is none. */
export function undone(history: History): History {
  const last = history.past.at(-1);
  if (!last) return history;
  return { present: last.before, past: history.past.slice(0, -1), future: [...history.future, last] };
}

/** One step forth again; the same history where there is none. */
export function redone(history: History): History {
  const next = history.future.at(-1);
  if (!next) return history;
  return {
    present: applyEdit(history.present, next.edit),
    past: [...history.past, next],
    future: history.future.slice(0, -1),
  };
}

/** Back to the state before the change at that position of the past. */
export function backTo(history: History, position: number): History {
  let h = history;
  while (h.past.length > position && h.past.length > 0) h = undone(h);
  return h;
}

/** Equal as JSON. */
function same(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return Object.is(a, b);
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const [ka, kb] = [Object.keys(a), Object.keys(b)];
  return (
    ka.length === kb.length &&
    ka.every((k, i) => k === kb[i] && same((a as Record<string, unknown>)[k], (b as Record<string, unknown>)[k]))
  );
}

import { type FilePath, isList, isObject, type JsonValue, pathText } from '../../lib/campaign/edit/index.js';

/** A value of the file that answers a search. */
export interface Found {
  readonly path: FilePath;
  readonly text: string;
  readonly value: string;
}

/** Values whose path or text holds every word of the search; at most `limit`. */
export function find(file: JsonValue, search: string, limit = 12): Found[] {
  const words = search
    .toLowerCase()
    .split(/\s+/)
    .filter((w) => w !== '');
  if (words.length === 0) return [];
  const found: Found[] = [];
  const walk = (value: JsonValue, path: FilePath): void => {
    if (found.length >= limit) return;
    if (isList(value)) for (const [i, v] of value.entries()) walk(v, [...path, i]);
    else if (isObject(value)) for (const [k, v] of Object.entries(value)) walk(v, [...path, k]);
    else {
      const text = pathText(file, path);
      const shown = String(value);
      const hay = `${text.replaceAll('.', ' ')} ${shown}`.toLowerCase();
      if (words.every((w) => hay.includes(w))) found.push({ path, text, value: shown });
    }
  };
  walk(file, []);
  return found;
}

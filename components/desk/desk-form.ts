import { html, nothing, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import {
  type Edit,
  type FilePath,
  isList,
  isObject,
  type JsonValue,
  pathText,
  valueAt,
} from '../../lib/campaign/edit/index.js';
import type { Fault } from '../../lib/campaign/fault.js';
import {
  type Descriptor,
  isBuilt,
  isBuiltKind,
  type Key,
  type Keys,
  quantityKeys,
} from '../../lib/campaign/schema/index.js';
import { type ShareScale, shareBar } from '../charts/share-bar.js';
import { emptyValue, fieldText, typedValue } from './field-texts.js';

/** What a form needs of the desk it stands in. */
export interface FormContext {
  readonly file: JsonValue;
  /** faults by path */
  readonly faults: ReadonlyMap<string, readonly Fault[]>;
  /** share of the variance by path, in the link in hand */
  readonly shares: ReadonlyMap<string, number>;
  readonly scale: ShareScale;
  /** fields that were added and hold nothing yet */
  readonly pending: ReadonlySet<string>;
  edit(edit: Edit): void;
  /** opens an empty field for a key */
  open(path: string): void;
}

const inside = (at: string, key: string): string => (at === '' ? key : `${at}.${key}`);

const PERCENT = (share: number) => `${(100 * share).toFixed(Math.abs(share) < 0.1 ? 1 : 0)}\u00a0%`;

/** Fields for every key of an object, those that stand there and one control that adds the others. */
export function objectForm(
  context: FormContext,
  keys: Keys,
  path: FilePath,
  name: string,
  skip: readonly string[] = [],
): TemplateResult {
  const value = valueAt(context.file, path);
  const object = isObject(value) ? value : {};
  const at = pathText(context.file, path);
  const usable = Object.entries(keys).filter(([key]) => !skip.includes(key) && isBuilt(name, key));
  const shown = usable.filter(
    ([key, k]) =>
      key in object || k.required || context.pending.has(inside(at, key)) || context.faults.has(inside(at, key)),
  );
  const others = usable.filter((entry) => !shown.includes(entry));
  const unknown = Object.keys(object).filter((key) => !skip.includes(key) && !(key in keys));
  return html`<div class="form">
    ${repeat(
      shown,
      ([key]) => key,
      ([key, k]) => keyField(context, k, [...path, key]),
    )}
    ${unknown.map((key) => unknownKey(context, [...path, key]))}
    ${
      others.length > 0
        ? html`<label class="add"
            >add
            <select
              aria-label="add to ${at || 'the campaign'}"
              .value=${''}
              @change=${(event: Event) => {
                const select = event.target as HTMLSelectElement;
                const key = select.value;
                select.value = '';
                if (key !== '') addKey(context, keys[key]!, [...path, key]);
              }}
            >
              <option value=""></option>
              ${others.map(([key, k]) => html`<option value=${key}>${k.label}</option>`)}
            </select></label
          >`
        : nothing
    }
  </div>`;
}

function addKey(context: FormContext, key: Key<Descriptor, boolean>, path: FilePath): void {
  const value = emptyValue(key.descriptor);
  if (value === null) context.open(pathText(context.file, path));
  else context.edit({ kind: 'set', path, value });
}

function unknownKey(context: FormContext, path: FilePath): TemplateResult {
  return html`<div class="field wrong">
    <span class="label">${String(path.at(-1))}</span>
    <span class="typed">${fieldText(valueAt(context.file, path))}</span>
    ${removeButton(context, path)} ${faultNotes(context, path)}
  </div>`;
}

/** Faults of a field: of the value itself, or of the text inside a quantity's object. */
const faultsAt = (context: FormContext, at: string): readonly Fault[] => [
  ...(context.faults.get(at) ?? []),
  ...(context.faults.get(`${at}.value`) ?? []),
];

const removeButton = (context: FormContext, path: FilePath): TemplateResult =>
  html`<button
    type="button"
    class="word"
    aria-label="remove ${pathText(context.file, path)}"
    @click=${() => context.edit({ kind: 'remove', path })}
  >
    remove
  </button>`;

/** Faults of a field: what was read, what to write, and one button that writes it right where the message says how. */
function faultNotes(context: FormContext, path: FilePath): TemplateResult | typeof nothing {
  const faults = faultsAt(context, pathText(context.file, path));
  if (faults.length === 0) return nothing;
  const place = isObject(valueAt(context.file, path)) ? [...path, 'value'] : path;
  return html`${faults.map((f) => {
    const right = /(?:^|[:;,] )write (.+)$/.exec(f.expected)?.[1]?.replace(/^"|"$/g, '');
    return html`<p class="fault-note">
      <b>read</b> ${f.found}. <b>write</b> ${f.expected}
      ${
        right
          ? html`<button type="button" class="btn small" @click=${() => context.edit({ kind: 'set', path: place, value: right })}>
              Write ${right}
            </button>`
          : nothing
      }
    </p>`;
  })}`;
}

/** One key of an object: its field, its weight, its faults, its pieces. */
function keyField(context: FormContext, key: Key<Descriptor, boolean>, path: FilePath): TemplateResult {
  const value = valueAt(context.file, path);
  const at = pathText(context.file, path);
  const { descriptor } = key;
  const removable = value !== undefined && !key.required;
  if (descriptor.type === 'object' || descriptor.type === 'variant' || descriptor.type === 'list')
    return html`<fieldset class="group">
      <legend>${key.label} ${removable ? removeButton(context, path) : nothing}</legend>
      ${faultNotes(context, path)} ${valueForm(context, descriptor, path, key.label)}
    </fieldset>`;
  const share = context.shares.get(at);
  const wrong = faultsAt(context, at).length > 0;
  return html`<div class=${wrong ? 'field wrong' : 'field'}>
    <label class="label" for=${`d-${at}`} title=${key.help}>${key.label}</label>
    ${
      descriptor.type === 'pieces' && isList(value)
        ? html`<span class="dim">in pieces</span>`
        : valueForm(context, descriptor, path, key.label)
    }
    <span class="weight">
      ${share === undefined ? nothing : html`${shareBar(share, 'input', context.scale)}<span class="share">${PERCENT(share)}</span>`}
    </span>
    ${removable ? removeButton(context, path) : html`<span></span>`} ${faultNotes(context, path)}
    ${descriptor.type === 'quantity' || descriptor.type === 'pieces' ? pieces(context, descriptor, path) : nothing}
  </div>`;
}

/** The control or controls for a value of any kind. */
export function valueForm(context: FormContext, descriptor: Descriptor, path: FilePath, label: string): TemplateResult {
  const value = valueAt(context.file, path);
  const at = pathText(context.file, path);
  switch (descriptor.type) {
    case 'object':
      return objectForm(context, descriptor.keys, path, descriptor.name);
    case 'variant': {
      const kind = isObject(value) && typeof value['kind'] === 'string' ? value['kind'] : '';
      const chosen = Object.hasOwn(descriptor.variants, kind) ? descriptor.variants[kind]! : null;
      return html`<div class="form">
        <div class="field">
          <label class="label" for=${`d-${at}.kind`}>${descriptor.label}</label>
          ${selectOf(
            `d-${at}.kind`,
            kind,
            Object.keys(descriptor.variants).filter((k) => isBuiltKind(descriptor.name, k)),
            (k) => context.edit({ kind: 'set', path: [...path, 'kind'], value: k }),
          )}
        </div>
        ${chosen ? objectForm(context, chosen.keys, path, chosen.name, ['kind']) : nothing}
      </div>`;
    }
    case 'list':
      return listForm(context, descriptor, path, label);
    case 'enum':
      return selectOf(`d-${at}`, fieldText(value), descriptor.values as readonly string[], (v) =>
        set(context, path, v),
      );
    case 'boolean':
      return selectOf(`d-${at}`, fieldText(value), ['true', 'false'], (v) => set(context, path, v === 'true'));
    case 'reference': {
      const items = valueAt(context.file, [descriptor.list]);
      const ids = isList(items)
        ? items.flatMap((x) => (isObject(x) && typeof x['id'] === 'string' ? [x['id']] : []))
        : [];
      return selectOf(`d-${at}`, fieldText(value), [...new Set([...ids, ...descriptor.builtIn])], (v) =>
        set(context, path, v),
      );
    }
    case 'id':
      return input(context, path, `d-${at}`, fieldText(value), (text) => {
        const from = fieldText(value);
        context.edit(
          from !== '' && typeof path[1] === 'number'
            ? { kind: 'rename', list: descriptor.list, from, to: text.trim() }
            : { kind: 'set', path, value: text.trim() },
        );
      });
    default:
      return input(context, path, `d-${at}`, fieldText(value), (text) => {
        const typed = typedValue(text, descriptor);
        if (typed === '' && value !== undefined) context.edit({ kind: 'remove', path });
        else if (typed !== '') set(context, isObject(value) && 'value' in value ? [...path, 'value'] : path, typed);
      });
  }
}

const set = (context: FormContext, path: FilePath, value: JsonValue) => context.edit({ kind: 'set', path, value });

function input(
  context: FormContext,
  path: FilePath,
  id: string,
  text: string,
  commit: (text: string) => void,
): TemplateResult {
  const at = pathText(context.file, path);
  return html`<input
    id=${id}
    data-path=${at}
    type="text"
    autocomplete="off"
    spellcheck="false"
    aria-label=${at}
    aria-invalid=${faultsAt(context, at).length > 0 ? 'true' : 'false'}
    .value=${text}
    @change=${(event: Event) => {
      const typed = (event.target as HTMLInputElement).value;
      if (typed !== text) commit(typed);
    }}
  />`;
}

function selectOf(
  id: string,
  value: string,
  values: readonly string[],
  commit: (value: string) => void,
): TemplateResult {
  const all = value === '' || values.includes(value) ? values : [value, ...values];
  return html`<select
    id=${id}
    aria-label=${id.slice(2)}
    @change=${(event: Event) => {
      const chosen = (event.target as HTMLSelectElement).value;
      if (chosen !== '' && chosen !== value) commit(chosen);
    }}
  >
    ${value === '' ? html`<option value="" selected></option>` : nothing}
    ${all.map((v) => html`<option value=${v} ?selected=${v === value}>${v}</option>`)}
  </select>`;
}

function listForm(
  context: FormContext,
  descriptor: Extract<Descriptor, { type: 'list' }>,
  path: FilePath,
  label: string,
): TemplateResult {
  const value = valueAt(context.file, path);
  const items = isList(value) ? value : [];
  const { item } = descriptor as { item: Descriptor };
  return html`<ol class="items">
      ${items.map(
        (_, i) => html`<li>
          ${valueForm(context, item, [...path, i], label)}
          <span class="item-tools">
            ${
              i > 0
                ? html`<button type="button" class="word" aria-label="move ${pathText(context.file, [...path, i])} up" @click=${() => context.edit({ kind: 'move', path, from: i, to: i - 1 })}>up</button>`
                : nothing
            }
            ${removeButton(context, [...path, i])}
          </span>
          ${item.type === 'object' || item.type === 'variant' ? faultNotes(context, [...path, i]) : nothing}
        </li>`,
      )}
    </ol>
    <button type="button" class="word" @click=${() => context.edit({ kind: 'insert', path, value: emptyValue(item) ?? '' })}>
      add to ${label.toLowerCase()}
    </button>`;
}

/** Source, tide and the other keys of a quantity's object form; `pieces` of an uncertainty. */
function pieces(context: FormContext, descriptor: Descriptor, path: FilePath): TemplateResult | typeof nothing {
  const value = valueAt(context.file, path);
  if (descriptor.type === 'pieces') {
    if (!isList(value))
      return html`<button type="button" class="word piece" @click=${() => context.edit({ kind: 'set', path, value: [value === undefined ? { u: '' } : { u: value }, { u: '' }] })}>
        split into pieces
      </button>`;
    return html`<div class="pieces">${listForm(context, { type: 'list', item: descriptor.piece, pathBy: 'position', length: { min: 0, max: 99 } } as Extract<Descriptor, { type: 'list' }>, path, 'pieces')}</div>`;
  }
  if (descriptor.type !== 'quantity' || value === undefined) return nothing;
  const keys = quantityKeys(descriptor);
  const skip = ['value'];
  return html`<details class="pieces">
    <summary>source, tide and more</summary>
    ${objectForm(context, keys as Keys, path, String(path.at(-1)), skip)}
  </details>`;
}

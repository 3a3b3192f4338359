import { html, nothing, type TemplateResult } from 'lit';
import type { BudgetGroup, BudgetPart, GroupedBudget } from '../../lib/answers/budget-groups.js';
import { kindOfInput, kindOfSource } from '../../lib/answers/what-if-text.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { Model } from '../../lib/model/model.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { uText } from '../../lib/report/budget-export.js';
import { inputUnit } from '../../lib/report/input-unit.js';
import { sourceText } from '../../lib/report/input-words.js';
import { axisBar, axisNumbers, type ShareAxis, shareAxis } from '../charts/share-bar.js';
import { signedBars } from '../charts/signed-bars.js';
import { inputName } from '../shared/input-name.js';
import { quantityText } from '../shared/number.js';
import { plainText, type RichText, richText, sentenceCase } from '../shared/rich-text.js';
import { cancellation, correlationWords, in1e18 } from './budget-words.js';
import { type Edit, type Edits, type EditTarget, keyOf } from './what-if-edits.js';

/** What the rows show and whom they tell. */
export interface BudgetTableContext {
  readonly campaign: Campaign;
  readonly model: Model;
  readonly stated: GroupedBudget;
  /** with the changes; null: nothing is changed, or the change cannot be computed */
  readonly changed: GroupedBudget | null;
  readonly edits: Edits;
  /** groups whose inputs are shown, and 'rest' */
  readonly open: ReadonlySet<string>;
  /** on paper everything is open; on screen what is folded is not even made, for it takes longer than the rest */
  readonly isPrinting: boolean;
  /** the row whose control is shown where there is room for one only */
  readonly inHand: string | null;
  /** of the caption, and in the names of controls */
  readonly id: string;
  readonly caption: string;
  /** whether c says something: of a systematic it is one */
  readonly hasSensitivity: boolean;
  /** heading of the column with the shares */
  readonly shareHead: string;
  factor(target: EditTarget, factor: number): void;
  type(target: EditTarget, text: string, stated: string): void;
  toggle(group: string): void;
  take(row: string): void;
}

/** Rows under this share stand behind a word, unless much cancels in them. */
const SMALL_SHARE = 0.001;
/** Errors that would make so much of the variance if they were independent are worth a row even where they cancel. */
const WORTH_A_ROW = 0.01;

const isSmall = (group: BudgetGroup, u: number): boolean =>
  group.parts.every(({ share }) => Math.abs(share) < SMALL_SHARE) && (group.independentUy / u) ** 2 < WORTH_A_ROW;

export const groupKey = ({ source, parts }: BudgetGroup): string =>
  `${source ?? ''} ${source === null ? parts[0]!.input : ''}`;

const isShared = ({ source, parts }: BudgetGroup): boolean => source !== null && parts.length > 1;

/** Every input under its source, by falling share: u, sensitivity, effect, share as a bar about one zero, and what if. */
export function budgetTable(context: BudgetTableContext): TemplateResult {
  const { stated, changed, open } = context;
  const small = stated.groups.filter((group) => isSmall(group, stated.u));
  const large = stated.groups.filter((group) => !small.includes(group));
  const rest = small.length > 1 ? small : [];
  const main = small.length > 1 ? large : stated.groups;
  const shares = [...stated.groups, ...(changed?.groups ?? [])].flatMap(({ share, parts }) => [
    share,
    ...parts.map((part) => part.share),
  ]);
  const axis = shareAxis(shares);
  const showRest = open.has('rest');
  return html`<table class="budget" role="table">
    <caption class="only-spoken">${context.caption}</caption>
    <thead role="rowgroup">
      <tr role="row">
        <th scope="col" role="columnheader">input</th>
        <th scope="col" role="columnheader" class="c-u"><i class="s">u</i>(<i class="s">x</i>)</th>
        ${
          context.hasSensitivity
            ? html`<th scope="col" role="columnheader" class="c-c"><i class="s">c</i> / 1e-18 <span class="nb">per unit</span></th>`
            : html`<td role="cell" class="c-c"></td>`
        }
        <th scope="col" role="columnheader" class="c-uy">
          <span class="nb"><i class="s">c</i>·<i class="s">u</i> / 1e-18</span>
        </th>
        <th scope="col" role="columnheader" class="c-bar">
          ${context.shareHead} ${changed ? html`<b class="in-hand no-print">| what if</b>` : nothing}
        </th>
        <th scope="col" role="columnheader" class="c-sh nb">share / %</th>
        <th scope="col" role="columnheader" class="c-ctl no-print">what if <i class="s">u</i> times</th>
      </tr>
    </thead>
    <tbody role="rowgroup">
      ${main.map((group) => groupRows(context, group, axis, ''))}
      ${showRest || context.isPrinting ? rest.map((group) => groupRows(context, group, axis, '')) : nothing}
      <tr role="row" class="rest">
        <th scope="row" role="rowheader">
          ${
            rest.length > 0
              ? html`<span class="sub no-print">${rest.length} rows below 0.1 %</span>
                  ${disclosure('rest', showRest, 'inputs', context)}`
              : html`<span class="only-spoken">scale in per cent</span>`
          }
        </th>
        <td role="cell" class="c-u"></td>
        <td role="cell" class="c-c"></td>
        <td role="cell" class="c-uy"></td>
        <td role="cell" class="c-bar">${axisNumbers(axis)}</td>
        <td role="cell" class="c-sh"></td>
        <td role="cell" class="c-ctl no-print"></td>
      </tr>
    </tbody>
  </table>`;
}

const disclosure = (key: string, isOpen: boolean, what: string, { toggle }: BudgetTableContext): TemplateResult =>
  html`<button type="button" class="word" aria-expanded=${isOpen ? 'true' : 'false'} @click=${() => toggle(key)}>
    ${isOpen ? 'hide' : 'show'} ${what}
  </button>`;

function groupRows(
  context: BudgetTableContext,
  group: BudgetGroup,
  axis: ShareAxis,
  className: string,
): TemplateResult {
  const { campaign, model, changed, open } = context;
  const { source, parts } = group;
  if (!isShared(group)) return partRow(context, parts[0]!, axis, className, '');
  const id = source!;
  const key = groupKey(group);
  const isOpen = open.has(key);
  const later = changed?.groups.find((one) => one.source === id) ?? null;
  const target: EditTarget = { kind: 'source', source: id, measures: kindOfSource(model, id) };
  const members = `${className} kid`;
  return html`${row(context, {
    target,
    className: `grp ${className}`,
    name: [sourceText(campaign, id)],
    sub: html`<span class="sub">${parts.length} inputs, ${correlationWords(campaign, id)}</span>
      ${disclosure(key, isOpen, 'inputs', context)}`,
    u: rangeOfU(parts),
    sensitivity: null,
    effect: group.uy,
    effectLater: changed ? (later?.uy ?? 0) : null,
    share: group.share,
    shareLater: changed ? (later?.share ?? 0) : null,
    kind: 'shared',
    axis,
  })}
  ${
    isOpen || context.isPrinting
      ? html`${parts.map((part) => partRow(context, part, axis, members, id))}
          ${cancellationRow(context, group, `${members} last`)}`
      : nothing
  }`;
}

/** u of the inputs of a source: one where they are alike, else from … to. */
function rangeOfU(parts: readonly BudgetPart[]): string {
  const units = new Set(parts.map(({ input }) => inputUnit(input)));
  if (units.size > 1) return '';
  const unit = [...units][0]!;
  const sizes = parts.map(({ u }) => u);
  const [low, high] = [Math.min(...sizes), Math.max(...sizes)].map((u) => uText(u, unit));
  return low === high ? low! : `${low!.replace(/\u00a0.*$/, '')} to ${high}`;
}

function partRow(
  context: BudgetTableContext,
  part: BudgetPart,
  axis: ShareAxis,
  className: string,
  within: string,
): TemplateResult {
  const { campaign, changed } = context;
  const { input, source } = part;
  const later = changed?.groups.flatMap((group) => group.parts).find((p) => p.input === input && p.source === source);
  const aside: string[] = [];
  if (!part.isWhole) aside.push(source === null ? 'own part' : 'shared part');
  if (source !== null && within === '') aside.push(`of ${sourceText(campaign, source)}`);
  if (part.share < 0) aside.push('takes part of the others’ away');
  return row(context, {
    target: { kind: 'part', input, source, measures: kindOfInput(input) },
    className: `${className} ${part.share < 0 ? 'neg' : ''}`,
    name: inputName(campaign, input),
    sub: aside.length > 0 ? html`<span class="sub">${aside.join(', ')}</span>` : nothing,
    u: uText(part.u, inputUnit(input)),
    sensitivity: part.sensitivity,
    effect: part.effect,
    effectLater: changed ? (later?.effect ?? 0) : null,
    share: part.share,
    shareLater: changed ? (later?.share ?? 0) : null,
    kind: 'input',
    axis,
  });
}

interface Row {
  readonly target: EditTarget;
  readonly className: string;
  readonly name: RichText;
  readonly sub: TemplateResult | typeof nothing;
  /** as stated, two digits; '' where the inputs have different units */
  readonly u: string;
  readonly sensitivity: number | null;
  /** c·u, signed; of a source what is left of it */
  readonly effect: number;
  readonly effectLater: number | null;
  readonly share: number;
  readonly shareLater: number | null;
  readonly kind: 'input' | 'shared';
  readonly axis: ShareAxis;
}

function row(context: BudgetTableContext, one: Row): TemplateResult {
  const { edits, inHand, take } = context;
  const key = keyOf(one.target);
  const edit = edits.get(key) ?? null;
  const held = inHand === key || edit !== null;
  const spoken = plainText(one.name);
  return html`<tr role="row" class="${one.className} ${edit ? 'ed' : ''} ${held ? 'held' : ''}">
      <th scope="row" role="rowheader">
        <span class="nm">${richText(capital(one.name))}</span> ${one.sub}
        ${edit ? html`<span class="edw no-print">edited</span>` : nothing}
        <button type="button" class="word only-narrow" aria-expanded=${held ? 'true' : 'false'} @click=${() => take(key)}>
          what if
        </button>
      </th>
      <td role="cell" class="c-u" data-k="u(x)">${uField(context, one.target, one.u, edit, spoken)}</td>
      <td role="cell" class="c-c" data-k="c / 1e-18 per unit">
        ${one.sensitivity === null || !context.hasSensitivity ? nothing : quantityText(signed(one.sensitivity * 1e18, 4))}
      </td>
      <td role="cell" class="c-uy" data-k="c·u / 1e-18">
        ${wasAndNow(
          signedUnless(one.kind === 'shared', one.effect),
          one.effectLater === null ? null : signedUnless(one.kind === 'shared', one.effectLater),
          edit !== null,
        )}
      </td>
      <td role="cell" class="c-bar">${axisBar(one.share, one.kind, one.axis, one.shareLater)}</td>
      <td role="cell" class="c-sh">
        ${wasAndNow(percent(one.share), one.shareLater === null ? null : percent(one.shareLater), edit !== null)}
      </td>
      <td role="cell" class="c-ctl no-print">${factors(context, one.target, edit, spoken)}</td>
    </tr>
    ${edit?.problem ? problemRow(context, edit, one.u, one.className) : nothing}`;
}

const capital = (name: RichText): RichText =>
  typeof name[0] === 'string' ? [sentenceCase(name[0]), ...name.slice(1)] : name;

const signed = (value: number, significant: number): string =>
  formatConcise(value, null, { significant, sign: 'always' });
const signedUnless = (isSize: boolean, value: number): string => (isSize ? in1e18(value, 3) : signed(value * 1e18, 3));
const percent = (share: number): string =>
  (100 * share)
    .toFixed(1)
    .replace(/^-(?=0\.0$)/, '')
    .replace('-', '\u2212');

/** Stated value; on the row in hand struck through beside the changed one. */
const wasAndNow = (was: string, now: string | null, isEdited: boolean): TemplateResult =>
  now === null || now === was || !isEdited
    ? html`${quantityText(was)}`
    : html`<span class="was print-plain">${quantityText(was)}</span>
        <span class="now no-print">${quantityText(now)}</span>`;

function uField(
  { type, id }: BudgetTableContext,
  target: EditTarget,
  stated: string,
  edit: Edit | null,
  spoken: string,
): TemplateResult | typeof nothing {
  if (stated === '') return nothing;
  const isRange = stated.includes(' to ');
  const shown = edit?.text ?? (isRange ? '' : stated);
  return html`<span class="only-print">${quantityText(stated)}</span>
    ${edit && edit.text !== null ? html`<span class="was no-print">${quantityText(stated)}</span>` : nothing}
    <input
      class="field no-print ${edit ? 'ed' : ''}"
      type="text"
      autocomplete="off"
      autocapitalize="off"
      spellcheck="false"
      aria-label=${`u of ${spoken}${isRange ? ', for all of them' : ''}`}
      aria-invalid=${edit?.problem ? 'true' : 'false'}
      aria-describedby=${edit?.problem ? `${id}-${cssId(keyOf(target))}` : nothing}
      placeholder=${isRange ? stated : ''}
      size=${Math.max(7, shown.length, isRange ? stated.length : 0)}
      .value=${shown}
      @input=${(event: Event) => type(target, (event.target as HTMLInputElement).value, stated)}
      @keydown=${(event: KeyboardEvent) => {
        if (event.key === 'Escape') type(target, '', stated);
      }}
    />`;
}

const FACTORS = [
  [0.5, '½', 'half'],
  [1, '1', 'as stated'],
  [2, '2', 'twice'],
] as const;

function factors(
  { factor, id }: BudgetTableContext,
  target: EditTarget,
  edit: Edit | null,
  spoken: string,
): TemplateResult {
  const chosen = edit === null ? 1 : edit.factor;
  return html`<fieldset class="fac">
    <legend class="only-spoken">u of ${spoken} times</legend>
    ${FACTORS.map(
      ([value, text, words]) => html`<label
        ><input
          type="radio"
          name=${`${id}-${cssId(keyOf(target))}-f`}
          aria-label=${`${text}, ${words}`}
          .checked=${chosen === value}
          @change=${() => factor(target, value)}
        /><span>${text}</span></label
      >`,
    )}
  </fieldset>`;
}

const cssId = (key: string): string => key.replace(/[^\w-]+/g, '_');

/** A value that cannot be read stays as typed; what would be right stands under it. */
function problemRow({ id, type }: BudgetTableContext, edit: Edit, stated: string, className: string): TemplateResult {
  const { found, code, expected } = edit.problem!;
  const [wanted = expected, write = null] = expected.split(/: write /);
  return html`<tr role="row" class="why ${className.includes('kid') ? 'kid' : ''} no-print">
    <td role="cell" colspan="7">
      <div class="flt" role="alert" id=${`${id}-${cssId(keyOf(edit.target))}`}>
        <dl>
          <dt>read</dt>
          <dd><b>${found}</b></dd>
          <dt>why</dt>
          <dd>${code.replaceAll('-', ' ')}</dd>
          <dt>write</dt>
          <dd>${write ?? wanted}</dd>
        </dl>
        <button type="button" class="btn" @click=${() => type(edit.target, '', stated)}>
          ${stated === '' ? 'Put back' : `Put back ${stated}`}
        </button>
      </div>
    </td>
  </tr>`;
}

/** Inside a source: each input's effect to its side of zero, what is left of them, and the correlation to try another. */
function cancellationRow(context: BudgetTableContext, group: BudgetGroup, className: string): TemplateResult {
  const { campaign, edits } = context;
  const id = group.source!;
  const source = campaign.sources.find((one) => one.id === id);
  const target: EditTarget | null =
    source === undefined
      ? null
      : source.correlationLengthM === undefined
        ? { kind: 'correlation', source: id }
        : { kind: 'correlation-length', source: id };
  const stated =
    source?.correlationLengthM === undefined
      ? formatConcise(source?.correlation ?? 1, null)
      : formatLength(source.correlationLengthM);
  const edit = target && (edits.get(keyOf(target)) ?? null);
  return html`<tr role="row" class="cancel ${className} ${edit ? 'ed' : ''}">
      <th scope="row" role="rowheader" class="what">
        <span class="sub">what cancels: ${richText(cancellation(group))}</span>
      </th>
      <td role="cell" class="c-u"></td>
      <td role="cell" class="c-c"></td>
      <td role="cell" class="c-uy"></td>
      <td role="cell" class="c-bar">
        ${signedBars({
          effects: group.parts.map(({ effect }) => effect),
          independent: group.independentUy,
          left: group.uy,
        })}
      </td>
      <td role="cell" class="c-sh"></td>
      <td role="cell" class="c-ctl no-print">
        ${target ? correlationField(context, target, stated, edit ?? null, group) : nothing}
      </td>
    </tr>
    ${edit?.problem ? problemRow(context, edit, stated, className) : nothing}`;
}

const correlationField = (
  { type, id, campaign }: BudgetTableContext,
  target: EditTarget,
  stated: string,
  edit: Edit | null,
  group: BudgetGroup,
): TemplateResult => {
  const isLength = target.kind === 'correlation-length';
  const fieldId = `${id}-${cssId(keyOf(target))}-t`;
  return html`<label for=${fieldId}>${isLength ? 'length' : html`<i class="s">ρ</i>`}</label>
    <input
      class="field ${edit ? 'ed' : ''}"
      id=${fieldId}
      type="text"
      autocomplete="off"
      autocapitalize="off"
      spellcheck="false"
      size="7"
      aria-label=${`${isLength ? 'correlation length' : 'correlation between sites'} of ${sourceText(campaign, group.source!)}`}
      aria-invalid=${edit?.problem ? 'true' : 'false'}
      aria-describedby=${edit?.problem ? `${id}-${cssId(keyOf(target))}` : nothing}
      .value=${edit?.text ?? stated}
      @input=${(event: Event) => type(target, (event.target as HTMLInputElement).value, stated)}
      @keydown=${(event: KeyboardEvent) => {
        if (event.key === 'Escape') type(target, '', stated);
      }}
    />`;
};

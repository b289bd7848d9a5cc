import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type {
  ComponentOrder,
  FoundEntryView,
  FoundGroupView,
  FoundQuestion,
  TextChoice,
} from '#src/store/found-protocol.ts';
import { counted, formatCount } from '#src/table/number-format.ts';
import { groupMark } from './found-letter.ts';
import {
  candidateName,
  fateOf,
  quantityNames,
  questionSentences,
  shapeNames,
  unitName,
  valueHeading,
  valueText,
} from './found-words.ts';
import { siteChip } from './site-chip.ts';

/** What a group's part of the panel does. */
export interface GroupActs {
  readonly choose: (change: Partial<TextChoice>) => void;
  readonly go: (entry: Pick<FoundEntryView, 'line' | 'siteIndex'>) => void;
  readonly more: () => void;
}

/** One group: what it is, what is open about it, how it is read, and its tensors. */
export function foundGroup(
  group: FoundGroupView,
  entries: readonly FoundEntryView[],
  selectedSite: number | null,
  acts: GroupActs,
): TemplateResult {
  const { line, shape, quantity, unit, entryCount, questions, proposed, roleWord, role } = group;
  const fate = fateOf(group);
  const what = quantity === 'unknown' ? shapeNames[shape] : `${quantityNames[quantity]}, ${unitName(unit)}`;
  const known = roleWord === null || proposed ? '' : `: ${roleWord}`;
  return html`<details
    class="group ${proposed || questions.length > 0 ? '' : 'aside'}"
    ?open=${proposed || questions.length > 0}
  >
    <summary>
      ${groupMark(group.group)}
      <span>${role === 'decoy' && !proposed ? shapeNames[shape] : what}</span>
      <span class="soft">${counted(entryCount, 'tensor')}, line ${formatCount(line)}</span>
      <span class="fate ${fate}">${fate}${fate === 'taken' || fate === 'asks' ? '' : known}</span>
    </summary>
    <div class="body">
      ${questions.map((question) => questionPart(question, group, acts))} ${ways(group, acts)}
      ${entryTable(group, entries, selectedSite, acts)}
      <ul class="evidence" aria-label="What led to this">
        ${quantity === 'unknown' ? nothing : html`<li>${shapeNames[shape]}</li>`}
        ${group.evidence.map((text) => html`<li>${text}</li>`)}
      </ul>
    </div>
  </details>`;
}

/** Candidates side by side: a row for each, with what the first tensors would be. */
function questionPart({ kind, candidates }: FoundQuestion, group: FoundGroupView, acts: GroupActs) {
  return html`<div class="question" role="group" aria-label="Open: ${kind}">
    <p>${questionSentences[kind]}</p>
    <div class="scroll">
      <table>
        <thead>
          <tr>
            <th>read as</th>
            ${group.sample.map(({ label, element }) => html`<th>${label ?? element ?? '–'}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${candidates.map(
            ({ change, values }) =>
              html`<tr>
                <td>
                  <button class="line" @click=${() => acts.choose(change)}>${candidateName(change)}</button>
                </td>
                ${values.map((value) => html`<td class="number">${valueText(value)}</td>`)}
              </tr>`,
          )}
        </tbody>
      </table>
    </div>
  </div>`;
}

const units = ['au', '1e21V/m2', 'V/A2', 'V/m2'] as const;

function ways(group: FoundGroupView, { choose }: GroupActs): TemplateResult {
  const { choice, asFound, quantity, orders, proposed, signature, line } = group;
  const id = `g${group.group}`;
  const chosen = (event: Event): string | null => (event.target as HTMLSelectElement).value || null;
  return html`<div class="ways" role="group" aria-label="How line ${line} is read" title=${signature}>
      <label for="${id}-quantity">quantity</label>
      <select
        id="${id}-quantity"
        @change=${(event: Event) => choose({ quantity: chosen(event) as TextChoice['quantity'], unit: null })}
      >
        ${option('', choice?.quantity ?? '', `${quantityNames[asFound.quantity]}, as found`)}
        ${(['shielding', 'shift', 'efg'] as const).map((one) => option(one, choice?.quantity, quantityNames[one]))}
      </select>
      <label for="${id}-unit">unit</label>
      <select
        id="${id}-unit"
        ?disabled=${quantity !== 'efg'}
        @change=${(event: Event) => choose({ unit: chosen(event) as TextChoice['unit'] })}
      >
        ${quantity === 'efg' ? nothing : html`<option selected>${quantity === 'unknown' ? '–' : 'ppm'}</option>`}
        ${
          quantity === 'efg'
            ? html`${option('', choice?.unit ?? '', `${unitName(asFound.unit)}, as found`)}
              ${units.map((unit) => option(unit, choice?.unit, unitName(unit)))}`
            : nothing
        }
      </select>
      <label for="${id}-sign">sign</label>
      <select
        id="${id}-sign"
        @change=${(event: Event) => choose({ sign: Number(chosen(event)) === -1 ? -1 : 1 })}
      >
        ${option('1', String(choice?.sign ?? 1), 'as printed')}
        ${option('-1', String(choice?.sign ?? 1), quantity === 'shift' ? 'turned: minus the shielding' : 'turned')}
      </select>
      <label for="${id}-order">order</label>
      <select
        id="${id}-order"
        ?disabled=${orders.length === 0}
        @change=${(event: Event) => choose({ order: chosen(event) as ComponentOrder | null })}
      >
        ${option('', choice?.order ?? '', 'as found')}
        ${orders.map((one) => option(one, choice?.order, one === 'exchanged' ? 'rows and columns exchanged' : one))}
      </select>
    </div>
    <label class="take"
      ><input
        type="checkbox"
        .checked=${proposed}
        @change=${(event: Event) => {
          const taken = (event.target as HTMLInputElement).checked;
          choose({ taken: taken === asFound.proposed ? null : taken });
        }}
      />take these tensors</label
    >
    ${
      choice
        ? html`<button
            class="link"
            @click=${() => choose({ quantity: null, unit: null, sign: 1, order: null, taken: null })}
          >
            back to what was found
          </button>`
        : nothing
    }`;
}

function option(value: string, chosen: string | null | undefined, words: string): TemplateResult {
  return html`<option value=${value} .selected=${value === chosen}>${words}</option>`;
}

function entryTable(
  group: FoundGroupView,
  entries: readonly FoundEntryView[],
  selectedSite: number | null,
  { go, more }: GroupActs,
): TemplateResult {
  const left = group.entryCount - entries.length;
  const heading = valueHeading(
    group,
    entries.map(({ value }) => value),
  );
  return html`<div class="scroll">
      <table>
        <thead>
          <tr>
            <th>atom</th>
            <th>line</th>
            <th class="number">${heading}</th>
            <th>agrees with printed</th>
          </tr>
        </thead>
        <tbody>
          ${entries.map((entry) => {
            const { siteIndex, label, element, line, isComplete, proofs } = entry;
            const name = label ?? element ?? 'atom';
            return html`<tr class=${siteIndex !== null && siteIndex === selectedSite ? 'selected' : ''}>
              <td>${siteIndex === null ? nothing : siteChip(siteIndex)} ${name}</td>
              <td>
                <button class="link" aria-label="Line ${line}, ${name}" @click=${() => go(entry)}>
                  ${formatCount(line)}
                </button>
              </td>
              <td class="number">${isComplete ? valueText(entry.value) : 'incomplete'}</td>
              <td class="soft proofs">${proofs.join(', ') || '–'}</td>
            </tr>`;
          })}
        </tbody>
      </table>
    </div>
    ${left > 0 ? html`<button class="link" @click=${more}>${counted(left, 'more tensor')}</button>` : nothing}`;
}

import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { ConventionEntry } from '#src/store/conventions.ts';
import { symbolOf } from './convention-symbol.ts';
import { withSubscripts } from './symbol-text.ts';

/** One column of values beside the names: shielding, shift, or the field gradient in another unit. */
export interface ValueColumn {
  readonly heading: string;
  /** The entry of this column that stands in the row of the leading column's entry. */
  readonly entryFor: (leading: ConventionEntry) => ConventionEntry | null;
  readonly cell: (entry: ConventionEntry) => TemplateResult | typeof nothing;
}

interface Group {
  readonly convention: string;
  readonly reference: string;
  readonly entries: ConventionEntry[];
}

/** Entries in runs of one convention. */
function grouped(entries: readonly ConventionEntry[]): Group[] {
  const groups: Group[] = [];
  for (const entry of entries) {
    const last = groups.at(-1);
    if (last?.convention === entry.convention) last.entries.push(entry);
    else groups.push({ convention: entry.convention, reference: entry.reference, entries: [entry] });
  }
  return groups;
}

/** Every number of a quantity, by convention, with its name and definition; several scales side by side. */
export function conventionTable(
  entries: readonly ConventionEntry[],
  columns: readonly ValueColumn[],
): TemplateResult {
  return html`<div class="scroll">
    <table class="conventions">
      <thead>
        <tr>
          <th scope="col" colspan="2"></th>
          ${columns.map(({ heading }) => html`<th scope="col" class="number">${heading}</th>`)}
          <th scope="col">definition</th>
        </tr>
      </thead>
      ${grouped(entries).map(
        ({ convention, reference, entries: members }) =>
          html`<tbody>
            <tr class="group">
              <th scope="rowgroup" colspan=${columns.length + 3}>
                ${convention} <span>· ${reference}</span>
              </th>
            </tr>
            ${members.map((entry) => row(entry, columns))}
          </tbody>`,
      )}
    </table>
  </div>`;
}

function row(leading: ConventionEntry, columns: readonly ValueColumn[]): TemplateResult {
  const entries = columns.map(({ entryFor }) => entryFor(leading));
  const symbols = entries
    .filter((entry) => entry !== null)
    .filter((entry, i, all) => all.findIndex(({ symbol }) => symbol === entry.symbol) === i);
  return html`<tr>
    <th scope="row">
      ${symbols.map((entry, i) => html`${i > 0 ? ', ' : nothing}${symbolOf(entry)}`)}${
        leading.unit ? `/${leading.unit}` : nothing
      }
    </th>
    <td class="words">${plainName(leading)}</td>
    ${columns.map(({ cell }, i) => {
      const entry = entries[i];
      return html`<td class="number">${entry ? cell(entry) : nothing}</td>`;
    })}
    <td class="definition">
      <details>
        <summary>${withSubscripts(firstClause(leading.definition))}</summary>
        ${symbols.map((entry) => html`<p>${withSubscripts(entry.definition)}.</p>`)}
        <p>${leading.convention}: ${leading.reference}</p>
      </details>
    </td>
  </tr>`;
}

/** The scale stands in the column's heading, what a component is in the definition. */
function plainName({ name }: ConventionEntry): string {
  return name.replace(/ on the \w+ scale$/, '').replace(/ principal component( by magnitude)?$/, '');
}

/** What comes before the first semicolon; the rest is below it on demand. */
function firstClause(definition: string): string {
  return definition.split(';')[0] ?? definition;
}

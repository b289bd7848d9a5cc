import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { SceneExtent } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { openAxes, repeatsThroughout } from '#src/store/periodicity.ts';
import type { ShowContext } from './show-fields.ts';
import { choice, group, numberField, tick } from './show-fields.ts';

/** Distance round the atoms of a shell that is proposed, Å. */
const usualShellAngstrom = 3;

/** Which atoms are drawn, and how they are joined. */
export function atomsGroup(context: ShowContext): TemplateResult {
  const { picture, crystal, set } = context;
  const isMolecule = crystal.lattice === null;
  const noCell = isMolecule ? 'there is no cell' : null;
  return group(
    'Atoms',
    html`
      ${extentChoice(context, noCell)}
      ${picture.extent === 'range' && !noCell ? rangeFields(context) : nothing}
      ${picture.extent === 'shell' ? shellFields(context) : nothing}
      <div class="row">
        ${tick('bonds', picture.bonds, (on) => set({ bonds: on }, on ? 'show bonds' : 'hide bonds'), crystal.hasBonds ? null : 'none found')}
        ${tick('hydrogen bonds', picture.hydrogenBonds, (on) => set({ hydrogenBonds: on }, on ? 'show hydrogen bonds' : 'hide hydrogen bonds'), crystal.hasHydrogenBonds ? null : 'none found')}
        ${tick('bonded atoms outside', picture.bondedNeighbours, (on) => set({ bondedNeighbours: on }, on ? 'show bonded atoms outside' : 'hide bonded atoms outside'), noCell)}
        ${tick('cell edges', picture.cellEdges, (on) => set({ cellEdges: on }, on ? 'show cell edges' : 'hide cell edges'), noCell)}
      </div>
      ${polyhedraTicks(context)}
      ${tick('partial occupancy', picture.occupancy, (on) => set({ occupancy: on }, on ? 'show partial occupancy' : 'hide partial occupancy'), crystal.isPartlyOccupied ? null : 'all sites are full')}
      ${disorderChoice(context)} ${displacementFields(context)}
    `,
  );
}

function extentChoice(
  { picture, selection, set, crystal }: ShowContext,
  noCell: string | null,
): TemplateResult {
  const words: Readonly<Record<'auto' | SceneExtent, string>> = {
    auto: 'as fits the crystal',
    cell: 'one cell',
    molecules: 'whole molecules',
    asymmetric: 'asymmetric unit',
    range: 'a range of cells',
    shell: 'round the selected site',
  };
  const isRepeated = (crystal.periodic ?? repeatsThroughout).some(Boolean);
  const reasons: Partial<Record<'auto' | SceneExtent, string | null>> = {
    cell: noCell,
    range: noCell ?? (isRepeated ? null : 'the cell does not repeat'),
    asymmetric: noCell,
    molecules: crystal.hasBonds ? null : 'no bonds found',
    shell: selection || picture.shell ? null : 'select a site first',
  };
  const values = Object.keys(words) as ('auto' | SceneExtent)[];
  return choice(
    'extent',
    'drawn',
    picture.extent,
    values.map((value) => ({ value, words: words[value], reason: reasons[value] ?? null })),
    (extent, chosen) =>
      set(
        extent === 'shell' && selection
          ? {
              extent,
              shell: {
                siteIndices: [selection.siteIndex],
                radiusAngstrom: picture.shell?.radiusAngstrom ?? usualShellAngstrom,
              },
            }
          : { extent },
        `draw ${chosen}`,
      ),
  );
}

/** Along axes that do not repeat there is one cell, and nothing to type. */
function rangeFields({ picture, crystal, set }: ShowContext): TemplateResult {
  const periodic = crystal.periodic ?? repeatsThroughout;
  const open = openAxes(periodic);
  const axes = [0, 1, 2].filter((k) => periodic[k]);
  const field = (corner: 0 | 1, k: number): TemplateResult => {
    const letter = 'abc'[k]!;
    return numberField(
      `range-${corner}-${k}`,
      `${letter} ${corner === 0 ? 'from' : 'to'}`,
      '',
      picture.range[corner][k]!,
      { low: -50, high: 50 },
      (value) => {
        if (value === null) return;
        const range = picture.range.map((ends, c) =>
          c === corner ? ends.map((end, i) => (i === k ? value : end)) : ends,
        ) as unknown as SceneOptions['range'];
        set({ range }, 'draw another range of cells');
      },
    );
  };
  const isEmpty = axes.some((k) => picture.range[0][k]! > picture.range[1][k]!);
  return html`<div class="range">${axes.map((k) => html`${field(0, k)}${field(1, k)}`)}</div>
    ${axes.length > 0 ? html`<p class="note">In cells; fractions are allowed.</p>` : nothing}
    ${open.length > 0 ? html`<p class="note">The cell does not repeat along ${open.join(', ')}: one cell is drawn there.</p>` : nothing}
    ${isEmpty ? html`<p class="fault" role="alert">A range ends before it begins: nothing is in it.</p>` : nothing}`;
}

function shellFields({ picture, selection, labelOf, set }: ShowContext): TemplateResult {
  const shell = picture.shell ?? { siteIndices: [], radiusAngstrom: usualShellAngstrom };
  const isOther = selection !== null && !shell.siteIndices.includes(selection.siteIndex);
  return html`<div class="row">
    <span>round ${shell.siteIndices.map(labelOf).join(', ') || 'no site'}</span>
    ${numberField('shell', 'within', 'Å', shell.radiusAngstrom, { low: 0.5, high: 30 }, (value) => {
      if (value !== null) set({ shell: { ...shell, radiusAngstrom: value } }, 'set the radius of the shell');
    })}
    ${
      isOther
        ? html`<button
              class="line"
              @click=${() => set({ shell: { ...shell, siteIndices: [selection.siteIndex] } }, `draw the shell of ${labelOf(selection.siteIndex)}`)}
            >
              round ${labelOf(selection.siteIndex)}
            </button>
            <button
              class="line"
              @click=${() => set({ shell: { ...shell, siteIndices: [...shell.siteIndices, selection.siteIndex] } }, `add ${labelOf(selection.siteIndex)} to the shell`)}
            >
              add ${labelOf(selection.siteIndex)}
            </button>`
        : nothing
    }
  </div>`;
}

function polyhedraTicks({ picture, crystal, set }: ShowContext): TemplateResult {
  const elements = crystal.elements
    .map(({ element }) => element)
    .filter((element) => element !== 'H' && element !== 'D');
  if (!crystal.hasBonds || elements.length === 0)
    return html`<p class="note">Coordination polyhedra need bonds, of which there are none.</p>`;
  return html`<div class="row">
    <span>polyhedra about</span>
    ${elements.map((element) =>
      tick(element, picture.polyhedra.includes(element), (on) =>
        set(
          { polyhedra: elements.filter((one) => (one === element ? on : picture.polyhedra.includes(one))) },
          `${on ? 'show' : 'hide'} polyhedra about ${element}`,
        ),
      ),
    )}
  </div>`;
}

function disorderChoice({ picture, crystal, set }: ShowContext): TemplateResult {
  const { disorder } = picture;
  const groups = crystal.disorderGroups;
  const reason = groups.length > 0 ? null : 'no disorder is stated';
  const value = typeof disorder === 'object' ? `only ${disorder.only}` : disorder;
  return choice(
    'disorder',
    'disorder',
    value,
    [
      { value: 'patterns', words: reason ? 'none stated' : 'alternatives told apart' },
      { value: 'alike', words: 'all alike', reason },
      ...groups.map((name) => ({ value: `only ${name}`, words: `group ${name} only` })),
    ],
    (chosen, words) => {
      const only = groups.find((name) => chosen === `only ${name}`);
      const next =
        only !== undefined ? { only } : chosen === 'alike' ? ('alike' as const) : ('patterns' as const);
      set({ disorder: next }, `disorder: ${words}`);
    },
  );
}

function displacementFields({ picture, crystal, set }: ShowContext): TemplateResult {
  const reason = crystal.hasDisplacements ? null : 'the file has none';
  return html`${choice(
    'displacement',
    'displacement',
    picture.displacement,
    [
      { value: 'none', words: 'no ellipsoids' },
      { value: 'beside', words: 'on atoms without a tensor', reason },
      { value: 'instead', words: 'instead of tensors', reason },
    ],
    (displacement, words) => set({ displacement }, `displacement ellipsoids: ${words}`),
  )}
  ${
    picture.displacement === 'none'
      ? nothing
      : numberField(
          'probability',
          'probability',
          '%',
          Number((100 * picture.displacementProbability).toFixed(3)),
          { low: 1, high: 99.9 },
          (value) => {
            if (value !== null) set({ displacementProbability: value / 100 }, `displacement at ${value} %`);
          },
        )
  }`;
}

import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { SceneQuantity } from '#src/scene/scene.ts';
import type { ShowContext } from './show-fields.ts';
import { choice, group, numberField, tick } from './show-fields.ts';

const quantityWords: Readonly<Record<SceneQuantity, string>> = {
  shielding: 'shielding',
  shift: 'shift',
  efg: 'field gradient',
};

/** Which tensors are drawn, as what, how large. */
export function tensorsGroup(context: ShowContext): TemplateResult {
  const { picture, crystal, quantity, set } = context;
  if (!quantity) return group('Tensors', html`<p class="note">The files hold no tensors.</p>`);
  return group(
    'Tensors',
    html`
      <div class="row" role="radiogroup" aria-label="Quantity">
        ${crystal.quantities.map(
          (option) =>
            html`<label
              ><input
                type="radio"
                name="quantity"
                .checked=${picture.showTensors && option === quantity}
                @change=${() =>
                  set(
                    {
                      quantity: option,
                      showTensors: true,
                      tensorElements: 'auto',
                      unitsPerAngstrom: null,
                      colourLimits: null,
                    },
                    `show ${quantityWords[option]}`,
                  )}
              />${quantityWords[option]}</label
            >`,
        )}
        <label
          ><input
            type="radio"
            name="quantity"
            .checked=${!picture.showTensors}
            @change=${() => set({ showTensors: false }, 'hide tensors')}
          />none</label
        >
      </div>
      ${picture.showTensors ? tensorFields(context, quantity) : nothing}
    `,
  );
}

function tensorFields(context: ShowContext, quantity: SceneQuantity): TemplateResult {
  const { picture, scene, set } = context;
  const glyph = scene?.scale?.glyph ?? (quantity === 'efg' ? 'polar' : 'ellipsoid');
  const isAxial = picture.part === 'antisymmetric';
  return html`
    ${elementTicks(context, quantity)} ${siteFields(context)}
    ${choice(
      'copies',
      'on',
      picture.tensorCopies,
      [
        { value: 'all', words: 'all atoms of a site' },
        { value: 'first', words: 'the first atom of a site' },
        { value: 'orientations', words: 'one atom of each orientation' },
      ],
      (tensorCopies, words) => set({ tensorCopies }, `tensors on ${words}`),
    )}
    ${choice(
      'part',
      'part',
      picture.part,
      [
        { value: 'symmetric', words: 'symmetric' },
        {
          value: 'antisymmetric',
          words: 'antisymmetric, as its axial vector',
          reason: quantity === 'efg' ? 'a field gradient has none' : null,
        },
      ],
      (part, words) => set({ part, unitsPerAngstrom: null, colourLimits: null }, `part: ${words}`),
    )}
    ${choice(
      'glyph',
      'drawn as',
      picture.glyph,
      [
        { value: 'auto', words: 'as fits the quantity' },
        { value: 'ellipsoid', words: 'ellipsoid', reason: isAxial ? 'not an axial vector' : null },
        { value: 'polar', words: 'signed polar surface', reason: isAxial ? 'not an axial vector' : null },
        { value: 'axes', words: 'axes only', reason: isAxial ? 'not an axial vector' : null },
      ],
      (next, words) => set({ glyph: next, unitsPerAngstrom: null }, `tensors as ${words}`),
    )}
    ${glyph === 'ellipsoid' && !isAxial ? semiAxes(context, quantity) : nothing}
    ${scaleField(context, quantity)}
  `;
}

function semiAxes({ picture, scene, set }: ShowContext, quantity: SceneQuantity): TemplateResult {
  const fault = scene?.scale?.totalFault ?? null;
  const isEfg = quantity === 'efg';
  const isRefused = picture.ellipsoid === 'total' && scene?.scale?.kind === 'deviation';
  return html`${choice(
    'ellipsoid',
    'semi-axes',
    picture.ellipsoid,
    [
      { value: 'auto', words: 'as fits the values' },
      {
        value: 'total',
        words: 'principal values',
        reason: isEfg
          ? 'they add up to zero, so not all are positive'
          : fault && 'not all of them are positive',
      },
      { value: 'deviation', words: 'deviation from isotropic' },
    ],
    (ellipsoid, words) => set({ ellipsoid }, `semi-axes: ${words}`),
  )}
  ${
    fault && (!isEfg || isRefused)
      ? html`<p class="note" role=${isRefused ? 'status' : nothing}>
          Principal values as semi-axes are not offered: ${fault}.${isRefused ? ' Deviations are drawn.' : ''}
        </p>`
      : nothing
  }`;
}

function scaleField({ picture, scene, set }: ShowContext, quantity: SceneQuantity): TemplateResult {
  const taken = scene?.scale?.unitsPerAngstrom;
  return html`<div class="row">
    ${numberField(
      'scale',
      '1 Å =',
      quantity === 'efg' ? 'a.u.' : 'ppm',
      picture.unitsPerAngstrom,
      { low: 1e-6, high: 1e6 },
      (value) =>
        set({ unitsPerAngstrom: value }, value === null ? 'automatic scale' : `scale 1 Å = ${value}`),
    )}
    ${
      picture.unitsPerAngstrom === null
        ? html`<span class="soft">automatic</span>
            ${taken === undefined ? nothing : html`<button class="line" @click=${() => set({ unitsPerAngstrom: taken }, 'keep the scale')}>keep ${taken}</button>`}`
        : html`<button class="line" @click=${() => set({ unitsPerAngstrom: null }, 'automatic scale')}>
            automatic
          </button>`
    }
  </div>`;
}

/** Which elements carry tensors: a tick for each. */
function elementTicks(
  { picture, scene, crystal, set }: ShowContext,
  quantity: SceneQuantity,
): TemplateResult {
  const all = crystal.elements
    .filter(({ tensorCounts }) => tensorCounts[quantity] > 0)
    .map(({ element }) => element);
  if (all.length < 2) return html`<p class="note">Tensors of ${all.join('') || 'no element'}.</p>`;
  const shown = scene?.tensorElements ?? all;
  const change = (element: string, isOn: boolean): void => {
    const next = all.filter((one) => (one === element ? isOn : shown.includes(one)));
    if (next.length === 0) set({ showTensors: false }, 'hide tensors');
    else set({ tensorElements: next.length === all.length ? null : next }, `tensors of ${next.join(', ')}`);
  };
  return html`<div class="row" role="group" aria-label="Tensors of">
    <span>of</span>
    ${all.map((element) => tick(element, shown.includes(element) && picture.showTensors, (on) => change(element, on)))}
  </div>`;
}

/** Only some sites: those selected one after another. */
function siteFields({ picture, selection, labelOf, set }: ShowContext): TemplateResult {
  const only = picture.tensorSites;
  const index = selection?.siteIndex ?? null;
  const name = index === null ? '' : labelOf(index);
  return html`<div class="row">
    <span>${only ? `only ${only.map(labelOf).join(', ')}` : 'all sites'}</span>
    ${
      index === null
        ? html`<span class="soft">select a site to draw it alone</span>`
        : only?.includes(index)
          ? nothing
          : html`<button
              class="line"
              @click=${() => set({ tensorSites: [...(only ?? []), index] }, `tensors of ${name}`)}
            >
              ${only ? `add ${name}` : `only ${name}`}
            </button>`
    }
    ${only ? html`<button class="line" @click=${() => set({ tensorSites: null }, 'tensors of all sites')}>all sites</button>` : nothing}
  </div>`;
}

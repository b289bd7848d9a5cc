import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { DossierSettings, Reference } from '#src/store/dossier-types.ts';
import { nuclidesOf } from '#src/store/isotopes.ts';
import { latticeSettings } from '#src/store/frames.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { drawerStyles } from './drawer-styles.ts';
import { isotopeSymbol } from '#src/table/number-format.ts';
import { numberInput } from './number-input.ts';
import { askForPanel } from './panel.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

const symmetryChoices: readonly (readonly [DossierSettings['symmetry'], string])[] = [
  ['auto', 'of the file; searched where it states none'],
  ['file', 'of the file only'],
  ['find', 'searched in the atoms'],
  ['none', 'set aside: every atom is a site'],
];

/** Decisions that change numbers: reference and isotope of each element, quadrupole moments, symmetry. */
export class SettingsPanel extends StoreElement {
  static override styles = [
    shared,
    drawerStyles,
    css`
      .lines {
        display: grid;
        grid-template-columns: max-content minmax(0, 1fr);
        gap: 6px 12px;
        align-items: center;
      }
      .lines select {
        width: 100%;
      }
      .lines .soft {
        font-size: 13px;
      }
      .entry {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 4px 6px;
      }
      input[type='text'] {
        width: 9ch;
        text-align: right;
        font-variant-numeric: tabular-nums;
      }
      select {
        max-width: 100%;
      }
      .entry select {
        width: 168px;
      }
      .reference {
        display: grid;
        grid-template-columns: max-content minmax(0, 1fr);
        gap: 4px 12px;
        padding: 8px 0;
        border-top: 1px solid var(--hairline);
        align-items: center;
      }
    `,
  ];

  protected override readonly watches = ['derived', 'decisions'] as const;

  override render(): TemplateResult {
    const state = this.store?.state;
    const settings = state?.decisions?.settings;
    if (!state || !settings) return html``;
    return html`
      <header>
        <h2>Settings</h2>
        <button @click=${() => askForPanel(this, null)} aria-label="Close the settings">Close</button>
      </header>
      <p class="soft">Each changes numbers, can be undone, and holds for the files opened next.</p>
      <h3>Nuclides, shift reference, quadrupole moment</h3>
      ${elementsOf(state).map((element) => this.#element(element, state, settings))}
      <h3>Symmetry and frame</h3>
      <div class="lines">
        <label for="symmetry">symmetry</label>
        <select id="symmetry" @change=${(event: Event) => this.#symmetry(event)}>
          ${symmetryChoices.map(
            ([value, words]) =>
              html`<option value=${value} .selected=${settings.symmetry === value}>${words}</option>`,
          )}
        </select>
        <label for="tolerance">search tolerance</label>
        <span class="entry"
          >${numberInput('tolerance', settings.symmetryToleranceAngstrom, { low: 1e-6, high: 1 }, (value) =>
            this.#change({ symmetryToleranceAngstrom: value ?? 0.01 }, 'symmetry tolerance'),
          )}
          Å</span
        >
        <label for="merge">one atom within</label>
        <span class="entry"
          >${numberInput('merge', settings.mergeDistanceAngstrom, { low: 0, high: 1 }, (value) =>
            this.#change({ mergeDistanceAngstrom: value ?? 0.1 }, 'merge distance'),
          )}
          Å</span
        >
        <label for="frame">tensor frame</label>
        <select id="frame" @change=${(event: Event) => this.#frame(event)}>
          <option value="" .selected=${settings.frame === null}>as found with the tensors</option>
          ${latticeSettings.map(
            ({ name, sentence }) =>
              html`<option value=${name} .selected=${settings.frame === name}>${sentence}</option>`,
          )}
        </select>
      </div>
    `;
  }

  #element(
    element: string,
    state: WorkbenchState,
    settings: DossierSettings,
  ): TemplateResult | typeof nothing {
    const nuclides = nuclidesOf(element);
    if (nuclides.length === 0) return nothing;
    const found = state.derived?.crystal?.elements.find((one) => one.element === element);
    const isotope = found?.isotope ?? nuclides[0]?.symbol ?? element;
    const chooseIsotope = (event: Event): void => {
      const chosen = (event.target as HTMLSelectElement).value;
      this.#change({ isotopes: { ...settings.isotopes, [element]: chosen } }, `${element} as ${chosen}`);
    };
    const hasMoment = nuclides.some(({ symbol, momentMb }) => symbol === isotope && momentMb !== null);
    return html`<div class="reference" role="group" aria-label=${element}>
      <label for="isotope-${element}">${element} as</label>
      <select id="isotope-${element}" @change=${chooseIsotope}>
        ${nuclides.map(
          ({ symbol, spinText }) =>
            html`<option value=${symbol} .selected=${symbol === isotope}>
              ${isotopeSymbol(symbol)}, I = ${spinText}
            </option>`,
        )}
      </select>
      ${found?.tensorCounts.shielding ? this.#reference(isotope, settings) : nothing}
      ${hasMoment && found?.tensorCounts.efg ? this.#moment(isotope, settings) : nothing}
    </div>`;
  }

  #reference(isotope: string, settings: DossierSettings): TemplateResult {
    const reference = settings.references[isotope];
    const kind = reference?.kind ?? 'simple';
    const set = (change: Partial<Reference> | null): void => this.#setReference(isotope, change);
    const kinds: readonly (readonly [Reference['kind'], string])[] = [
      ['simple', 'δ = σref − σ'],
      ['exact', 'δ = (σref − σ)/(1 − σref)'],
      ['regression', 'δ = a + b σ'],
    ];
    return html`<label for="intercept-${isotope}">shift</label>
      <span class="entry">
        <select
          aria-label="Conversion of ${isotope}"
          @change=${(event: Event) => set({ kind: (event.target as HTMLSelectElement).value as Reference['kind'] })}
        >
          ${kinds.map(
            ([value, words]) => html`<option value=${value} .selected=${value === kind}>${words}</option>`,
          )}
        </select>
        <span>${kind === 'regression' ? 'a' : 'σref'} =</span>
        ${numberInput(
          `intercept-${isotope}`,
          reference?.interceptPpm ?? null,
          { low: -1e5, high: 1e5 },
          (value) => set(value === null ? null : { interceptPpm: value }),
        )}
        ppm
        ${
          kind === 'regression'
            ? html`, b =
              ${numberInput(`slope-${isotope}`, reference?.slope ?? -1, { low: -2, high: 2 }, (value) =>
                set({ slope: value ?? -1 }),
              )}`
            : nothing
        }
      </span>`;
  }

  #moment(isotope: string, settings: DossierSettings): TemplateResult {
    const own = settings.quadrupoleMomentsBarn[isotope];
    return html`<label for="moment-${isotope}">own Q</label>
      <span class="entry"
        >${numberInput(
          `moment-${isotope}`,
          own === undefined ? null : own * 1000,
          { low: -1e4, high: 1e4 },
          (value) => {
            const others = without(settings.quadrupoleMomentsBarn, isotope);
            const moments = value === null ? others : { ...others, [isotope]: value / 1000 };
            this.#change({ quadrupoleMomentsBarn: moments }, `Q of ${isotope}`);
          },
        )}
        mb <span class="soft">empty: from the table</span></span
      >`;
  }

  #setReference(isotope: string, change: Partial<Reference> | null): void {
    const references = this.store?.state.decisions?.settings.references ?? {};
    const others = without(references, isotope);
    const base: Reference = references[isotope] ?? { kind: 'simple', interceptPpm: 0, slope: -1, isotope };
    const next = change === null ? others : { ...others, [isotope]: { ...base, ...change } };
    this.#change({ references: next }, `reference of ${isotope}`);
  }

  #symmetry(event: Event): void {
    const symmetry = (event.target as HTMLSelectElement).value as DossierSettings['symmetry'];
    this.#change({ symmetry }, `symmetry: ${symmetry}`);
  }

  #frame(event: Event): void {
    const frame = (event.target as HTMLSelectElement).value || null;
    this.#change({ frame }, `tensor frame: ${frame ?? 'as found'}`);
  }

  #change(change: Partial<DossierSettings>, name: string): void {
    void this.store?.changeSettings(change, name);
  }
}

function without<Value>(record: Readonly<Record<string, Value>>, key: string): Record<string, Value> {
  return Object.fromEntries(Object.entries(record).filter(([name]) => name !== key));
}

function elementsOf({ derived }: WorkbenchState): string[] {
  return derived?.crystal?.elements.map(({ element }) => element) ?? [];
}

customElements.define('ellipsite-settings-panel', SettingsPanel);

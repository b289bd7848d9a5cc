import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Problem } from '#src/store/dossier-types.ts';
import { countProblems } from '#src/store/state.ts';
import { drawerStyles } from './drawer-styles.ts';
import { askForPanel } from './panel.ts';
import { raiseIsotopes } from '#src/table/number-format.ts';
import { proposalButtons } from './proposal-buttons.ts';
import { problemSummary, severityOrder } from './problem-summary.ts';
import { shared } from './styles.ts';
import { StoreElement } from './store-element.ts';

/** Problems drawn at most; a reader that kept more says so itself. */
const shownProblems = 500;

/** Everything that was guessed, repaired, dropped or undefined, each with its place in the source text. */
export class ProblemsDrawer extends StoreElement {
  static override styles = [
    shared,
    drawerStyles,
    css`
      h3 {
        margin: 12px 0 2px;
        font-weight: 400;
        color: var(--soft);
      }
      ul {
        list-style: none;
      }
      li {
        padding: 9px 0 10px;
        border-top: 1px solid var(--hairline);
        overflow-wrap: anywhere;
      }
      .severity {
        font-weight: 600;
      }
      .error .severity {
        color: var(--error);
      }
      .warning .severity {
        color: var(--warning);
      }
      code {
        font-size: 12px;
        color: var(--soft);
      }
      dl {
        display: grid;
        grid-template-columns: max-content 1fr;
        gap: 0 10px;
        margin: 3px 0 0;
        font-size: 13px;
      }
      dt {
        color: var(--soft);
      }
      dd {
        margin: 0;
      }
    `,
  ];

  protected override readonly watches = ['derived', 'refused'] as const;

  override render(): TemplateResult {
    const state = this.store?.state;
    if (!state) return html``;
    const { derived, refused } = state;
    return html`
      <header>
        <h2 id="title">Problems: ${problemSummary(countProblems(state))}</h2>
        <button @click=${this.#close} aria-label="Close the problems">Close</button>
      </header>
      ${
        refused
          ? html`<h3>
                Could not ${refused.what}; what was on screen stayed.
                <button class="link" @click=${() => this.store?.dismissRefusal()}>Forget it</button>
              </h3>
              ${this.#list(refused.problems, true)}
              <h3>The case on screen</h3>`
          : nothing
      }
      ${this.#list(derived?.problems ?? [], false)}
    `;
  }

  #list(problems: readonly Problem[], isRefused: boolean): TemplateResult {
    if (problems.length === 0) return html`<p class="soft">Nothing was guessed, repaired or left out.</p>`;
    const sorted = [...problems].sort(
      (a, b) => severityOrder.indexOf(a.severity) - severityOrder.indexOf(b.severity),
    );
    const more = sorted.length - shownProblems;
    return html`<ul>
      ${sorted.slice(0, shownProblems).map((problem) => this.#problem(problem, isRefused))}
      ${more > 0 ? html`<li>${more} more are not listed here.</li>` : nothing}
    </ul>`;
  }

  #problem(problem: Problem, isRefused: boolean): TemplateResult {
    const { severity, code, message, got, allowed, hint } = problem;
    const facts: readonly (readonly [string, string | null])[] = [
      ['found', got],
      ['allowed', allowed],
      ['what to do', hint],
    ];
    return html`<li class=${severity}>
      <p>
        <span class="severity">${severity}</span> <span>${raiseIsotopes(message)}</span>
        <code>${code}</code>
      </p>
      ${
        facts.some(([, value]) => value)
          ? html`<dl>
              ${facts.map(([name, value]) =>
                value
                  ? html`<dt>${name}</dt>
                      <dd>${name === 'what to do' ? raiseIsotopes(value) : value}</dd>`
                  : nothing,
              )}
            </dl>`
          : nothing
      }
      ${this.#place(problem, isRefused)} ${isRefused ? nothing : this.#proposal(problem)}
    </li>`;
  }

  /** A column that is proposed can be taken here, too. */
  #proposal({ code, file, line, message }: Problem): TemplateResult | typeof nothing {
    if (code !== 'xyz-column-proposed' || file === null) return nothing;
    const sourceId = this.store?.sourceOf({ file })?.id;
    const proposals = (this.store?.state.derived?.proposals ?? []).filter(
      (one) => one.sourceId === sourceId && one.line === line && message.includes(one.name),
    );
    return html`${proposals.map(
      (proposal) =>
        html`<p>Read <code>${proposal.name}</code> as</p>
          ${proposalButtons(this.store, proposal)}`,
    )}`;
  }

  #place({ file, line, column }: Problem, isRefused: boolean): TemplateResult | typeof nothing {
    if (file === null) return nothing;
    if (line === null) return html`<span class="soft">${file}</span>`;
    const known = this.store?.sourceOf({ file, isRefused }) ?? null;
    const place = `${file}, line ${line}${column === null ? '' : `, column ${column}`}`;
    if (known === null) return html`<span class="soft">${place}</span>`;
    return html`<button class="link" @click=${() => this.store?.showPlace({ file, line, isRefused })}>
      ${place}
    </button>`;
  }

  #close(): void {
    askForPanel(this, null);
  }
}

customElements.define('ellipsite-problems-drawer', ProblemsDrawer);

import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { EarlierWork, Keeper } from '#src/store/keeper.ts';
import { keptWorks } from '#src/store/work-database.ts';
import { counted } from '#src/table/number-format.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** What was worked on before in this browser: each can be opened, or deleted for good. */
export class EarlierWorkList extends StoreElement {
  static override properties = {
    keeper: { attribute: false },
    works: { state: true },
    said: { state: true },
  };

  static override styles = [
    shared,
    css`
      h3 {
        margin: 16px 0 2px;
      }
      ul {
        list-style: none;
        margin: 0;
        padding: 0;
      }
      li {
        display: grid;
        grid-template-columns: minmax(0, 1fr) auto auto;
        align-items: baseline;
        gap: 0 8px;
        padding: 4px 0;
        border-top: 1px solid var(--hairline);
        overflow-wrap: anywhere;
      }
      .soft {
        display: block;
        font-size: 13px;
      }
    `,
  ];

  declare keeper: Keeper | null;
  declare works: readonly EarlierWork[];
  declare said: string;

  protected override readonly watches = ['keeping'] as const;

  constructor() {
    super();
    this.keeper = null;
    this.works = [];
    this.said = '';
  }

  protected override firstUpdated(): void {
    void this.#list();
  }

  override render(): TemplateResult | typeof nothing {
    if (this.works.length === 0 && this.said === '') return nothing;
    return html`<h3>Earlier work</h3>
      <ul aria-label="Earlier work">
        ${this.works.map((work) => this.#row(work))}
      </ul>
      <p class="soft">
        This browser keeps the last ${keptWorks} works of closed tabs. Opening one leaves it here as it was.
      </p>
      <p role="status">${this.said}</p>`;
  }

  #row(work: EarlierWork): TemplateResult {
    const { title, savedAt, atomCount } = work;
    const when = new Date(savedAt).toLocaleString('en-GB', { dateStyle: 'medium', timeStyle: 'short' });
    const about = [when, ...(atomCount === null ? [] : [counted(atomCount, 'atom')])].join(' · ');
    return html`<li>
      <span>${title} <span class="soft">${about}</span></span>
      <button aria-label="Open ${title}, ${about}" @click=${() => this.#open(work)}>Open</button>
      <button aria-label="Delete ${title}, ${about}" @click=${() => this.#forget(work)}>Delete</button>
    </li>`;
  }

  async #list(): Promise<void> {
    this.works = (await this.keeper?.earlier().catch(() => [])) ?? [];
  }

  async #open({ id, title }: EarlierWork): Promise<void> {
    const opened = await this.keeper?.load(id).catch(() => null);
    this.said = opened ? '' : `${title} is not there any more, or a file of it.`;
    if (opened) await this.store?.openCase(opened);
    await this.#list();
  }

  async #forget({ id, title }: EarlierWork): Promise<void> {
    const isGone = await this.keeper?.forget(id).then(
      () => true,
      () => false,
    );
    this.said = isGone ? `${title} is deleted.` : `${title} could not be deleted.`;
    await this.#list();
  }
}

customElements.define('ellipsite-earlier-work', EarlierWorkList);

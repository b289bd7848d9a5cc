import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { ProposalSummary } from '#src/store/engine-protocol.ts';
import type { Store } from '#src/store/store.ts';

export const quantityWords = { shielding: 'shielding', shift: 'shift', efg: 'field-gradient' } as const;

/** Ways to take a proposed column: one button for each quantity it may be. */
export function proposalButtons(
  store: Store | null | undefined,
  { sourceId, name }: ProposalSummary,
): TemplateResult {
  return html`<div class="commands" role="group" aria-label="Read the column ${name} as">
    ${(['shielding', 'shift', 'efg'] as const).map(
      (option) =>
        html`<button class="line" @click=${() => store?.acceptColumn(sourceId, name, option)}>
          ${quantityWords[option]}
        </button>`,
    )}
  </div>`;
}

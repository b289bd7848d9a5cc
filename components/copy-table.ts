import type { TableTextRequest } from '#src/table/table-settings.ts';

/** Asks the engine for the table in one format. */
export type AskForText = (request: TableTextRequest) => Promise<string>;

/** `text`: tab-separated, for spreadsheets and programs; `rich`: the same and a formatted table, for documents. */
export type CopyKind = 'text' | 'rich';

/** Puts all rows in their present order and columns on the clipboard; a sentence says how it went. */
export async function copyTable(
  question: Omit<TableTextRequest, 'format'>,
  kind: CopyKind,
  ask: AskForText,
): Promise<string> {
  const { clipboard } = navigator as { readonly clipboard?: Clipboard };
  if (!clipboard) return 'This page may not write to the clipboard: it was not loaded from a safe address.';
  const blob = async (format: TableTextRequest['format'], type: string): Promise<Blob> =>
    new Blob([await ask({ ...question, format })], { type });
  // the texts are promises: the clipboard must be asked while the key or button still counts as the user's
  const text = blob('text', 'text/plain');
  try {
    const item =
      kind === 'text'
        ? new ClipboardItem({ 'text/plain': text })
        : new ClipboardItem({ 'text/plain': text, 'text/html': blob('html', 'text/html') });
    await clipboard.write([item]);
    const lines = (await (await text).text()).split('\n').length - 2;
    const rows = `${lines} row${lines === 1 ? '' : 's'}`;
    return kind === 'text' ? `${rows} copied as text.` : `${rows} copied as a table.`;
  } catch (error) {
    return `Nothing was copied: ${error instanceof Error ? error.message : String(error)}`;
  }
}

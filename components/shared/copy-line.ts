/** What became of a copy: in the clipboard; or marked on the page, where the clipboard is closed (a sandboxed frame, a
 *  page without a secure context). */
export type Copied = 'copied' | 'selected';

/** Copies a line; where that is not allowed, marks `shown` so that one key copies it. */
export async function copyLine(text: string, shown: Node): Promise<Copied> {
  try {
    await navigator.clipboard.writeText(text);
    return 'copied';
  } catch {
    const selection = getSelection();
    selection?.removeAllRanges();
    const range = document.createRange();
    range.selectNodeContents(shown);
    selection?.addRange(range);
    return 'selected';
  }
}

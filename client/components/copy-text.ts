/**
 * Puts text on the clipboard; false when the browser refuses. The clipboard API needs a secure origin, so a
 * hidden text area and the old command serve for a group's server on plain http.
 */
export async function copyText(text: string): Promise<boolean> {
  try {
    if (window.isSecureContext) {
      await navigator.clipboard.writeText(text);
      return true;
    }
  } catch {
    // Refused by the browser: the other way may still be open.
  }
  const area = document.createElement('textarea');
  area.value = text;
  area.readOnly = true;
  area.className = 'sr-only';
  const before = document.activeElement;
  (before?.closest('dialog') ?? document.body).append(area);
  area.select();
  try {
    return document.execCommand('copy');
  } catch {
    return false;
  } finally {
    area.remove();
    if (before instanceof HTMLElement) before.focus();
  }
}

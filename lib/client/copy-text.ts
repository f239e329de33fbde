/**
 * Copies the text of a field. Over plain http a browser has no clipboard to write to; there the field's own text is
 * selected and copied as by hand.
 *
 * @returns whether it was copied; if not, the text is selected and waits for Ctrl+C
 */
export async function copyField(field: HTMLInputElement): Promise<boolean> {
  try {
    if (window.isSecureContext) {
      await navigator.clipboard.writeText(field.value)
      return true
    }
  } catch {
    // Not allowed here: by hand, as over plain http.
  }
  field.focus()
  field.select()
  return document.execCommand('copy')
}

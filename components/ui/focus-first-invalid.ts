/** Puts the focus on the first field that may not be sent as it is; true when there is one. */
export function focusFirstInvalid(form: HTMLFormElement): boolean {
  const fields = form.querySelectorAll<HTMLInputElement | HTMLSelectElement | HTMLTextAreaElement>(
    'input, select, textarea',
  )
  const invalid = [...fields].find((field) => !field.validity.valid)
  invalid?.focus()
  return invalid !== undefined
}

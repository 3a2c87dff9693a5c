/** What stands in a text field. */
export function valueOf(element: HTMLElement): string {
  if (!(element instanceof HTMLInputElement || element instanceof HTMLTextAreaElement || element instanceof HTMLSelectElement))
    throw new Error('not a field')
  return element.value
}

export function isChecked(element: HTMLElement): boolean {
  if (!(element instanceof HTMLInputElement)) throw new Error('not a toggle')
  return element.checked
}

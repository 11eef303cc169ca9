/** What somebody who cannot see it is told of an element. */

/** The text that `aria-describedby` points at, joined; '' where it points at nothing. */
export function descriptionOf(element: Element): string {
  return (element.getAttribute('aria-describedby') ?? '')
    .split(' ')
    .filter(Boolean)
    .map((id) => {
      const found = document.getElementById(id)
      if (!found) throw new Error(`Described by ${id}, which is not there.`)
      return found.textContent
    })
    .join(' ')
}

/** What stands in a field. */
export function valueOf(element: Element): string {
  if (element instanceof HTMLInputElement) return element.value
  throw new Error(`A ${element.tagName} has no value.`)
}

/** Whether a box is ticked, or a choice chosen. */
export function isTicked(element: Element): boolean {
  if (element instanceof HTMLInputElement) return element.checked
  throw new Error(`A ${element.tagName} cannot be ticked.`)
}

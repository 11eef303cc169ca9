/** Text that can be stored. */

/** `text` without what PostgreSQL cannot hold: NUL, and halves of characters that lost the other half. */
export function storable(text: string): string {
  return text.replace(/[\u0000\p{Surrogate}]/gu, '')
}

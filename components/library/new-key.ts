let drafts = 0

/** A name for the fields of a part that was added in this browser. */
export function newKey(): string {
  drafts += 1
  return `n${drafts}`
}

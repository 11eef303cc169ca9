/** Kit as people read it. */

/** 'Two dumbbells', 'Mat', '3 bands'. `item` is the trade's word in the singular. */
export function kitText(item: string, count: number): string {
  const many = /(?:s|x|ch|sh)$/.test(item) ? `${item}es` : `${item}s`
  const text = count === 2 ? `two ${many}` : count > 2 ? `${count} ${many}` : item
  return text.charAt(0).toUpperCase() + text.slice(1)
}

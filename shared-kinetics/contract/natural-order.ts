/** Printable ASCII as the Unicode collation algorithm orders it, letters of either case together. */
const order = ' _-,;:!?.\'"()[]{}@*/\\&#%`^+<=>|~$0123456789abcdefghijklmnopqrstuvwxyz'
const rankOf = new Map(Array.from(order, (sign, rank) => [sign, rank]))
const plain = /^[ -~]*$/
const parts = /\d+|\D/g

let collator: Intl.Collator | null = null

/**
 * Order of names as a person counts: 2 before 10, letters of either case together. That of `Intl.Collator('en', { numeric: true })`, whose tables take longer to load than
 * reading a folder does; it is asked only where a name is not plain ASCII.
 */
export function naturalOrder(a: string, b: string): number {
  if (!plain.test(a) || !plain.test(b)) {
    collator ??= new Intl.Collator('en', { numeric: true })
    return collator.compare(a, b)
  }
  const [ones, others] = [a.match(parts) ?? [], b.match(parts) ?? []]
  let byCase = 0
  for (const [i, one] of ones.entries()) {
    const other = others[i]
    if (other === undefined) return 1
    const difference = compareParts(one, other)
    if (difference !== 0) return difference
    // Where nothing else tells names apart, a small letter comes first.
    if (byCase === 0 && one !== other && !isNumber(one)) byCase = one > other ? -1 : 1
  }
  return ones.length < others.length ? -1 : byCase
}

const isNumber = (part: string): boolean => part >= '0' && part <= ':' && part !== ':'

const rank = (part: string): number => rankOf.get(part.charAt(0).toLowerCase()) ?? order.length

function compareParts(one: string, other: string): number {
  if (isNumber(one) && isNumber(other)) {
    const [digits, otherDigits] = [one.replace(/^0+/, ''), other.replace(/^0+/, '')]
    return Math.sign(digits.length - otherDigits.length) || (digits < otherDigits ? -1 : digits > otherDigits ? 1 : 0)
  }
  return Math.sign(rank(one) - rank(other))
}

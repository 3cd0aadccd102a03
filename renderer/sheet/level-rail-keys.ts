/** Levels passed by one press of Page Up or Page Down. */
const page = 5

/** The level a key leads to, or null for a key that the rail leaves alone. */
export function levelAfterKey(key: string, index: number, levels: number): number | null {
  const target = targetOf(key, index, levels)
  return target === null ? null : Math.min(levels - 1, Math.max(0, target))
}

function targetOf(key: string, index: number, levels: number): number | null {
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return index + 1
    case 'ArrowLeft':
    case 'ArrowDown':
      return index - 1
    case 'PageUp':
      return index + page
    case 'PageDown':
      return index - page
    case 'Home':
      return 0
    case 'End':
      return levels - 1
    default:
      return null
  }
}

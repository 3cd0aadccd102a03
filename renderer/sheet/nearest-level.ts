/** Index of the level nearest to a conversion; 0 where there are no levels. */
export function nearestLevel(levels: readonly number[], conversion: number): number {
  let nearest = 0
  for (const [i, level] of levels.entries()) {
    if (Math.abs(level - conversion) < Math.abs((levels[nearest] ?? 0) - conversion)) nearest = i
  }
  return nearest
}

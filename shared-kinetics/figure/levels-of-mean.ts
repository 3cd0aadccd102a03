import type { MeanEnergy } from '../tasks/study-result.ts'
import { levelText } from './nice-axis.ts'

/** What a mean rests on, for the words beside it: `17 levels`, or `12 of 17 levels, 0.25 to 0.8` where some of its range has no number. */
export function levelsOfMean({ levelsUsed, levelsInRange, firstLevel, lastLevel }: MeanEnergy): string {
  const plural = levelsInRange === 1 ? '' : 's'
  if (levelsUsed === levelsInRange) return `${levelsUsed} level${plural}`
  const range = firstLevel === null || lastLevel === null ? '' : `, ${levelText(firstLevel)} to ${levelText(lastLevel)}`
  return `${levelsUsed} of ${levelsInRange} level${plural}${range}`
}

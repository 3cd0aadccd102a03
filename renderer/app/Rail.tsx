import { useMemo } from 'react'
import type { Maybe, StudyResult } from '../../shared-kinetics/contract/study-result.ts'
import { formatAt, levelQuantity } from '../sheet/at-level.ts'
import { endProgrammes, meanAtLevel, programmeRange } from '../sheet/end-programmes.ts'
import { decimals, formatInterval, formatLevel, formatWithInterval, halfWidth, statusWords } from '../sheet/format.ts'
import { LevelRail } from '../sheet/LevelRail.tsx'
import { railBars, railCaption } from '../sheet/rail-bars.ts'
import { Remarked } from '../sheet/Remarked.tsx'
import type { SheetActions } from '../stages/stage-props.ts'
import { intervalWordsAt, shortKinds, type ShownOfMethod } from '../stages/activation/shown-interval.ts'
import { useShown } from '../stages/activation/use-shown.ts'
import { useView } from '../state/services.ts'
import { chosenAmong } from '../state/view-store.ts'

/** What the bars mean; where they stand in for a kind that is still being worked out, that too. */
function captionOf(widths: readonly Maybe[], mean: Maybe, shown: ShownOfMethod | null): readonly string[] {
  if (shown === null) return []
  const kind = shown.interval?.kind ?? shown.kind
  const lines = railCaption(widths, mean, shortKinds[kind])
  return kind === shown.kind ? lines : [...lines, `${shortKinds[shown.kind]}: not worked out yet`]
}

/** The level rail with what the chosen method says at the level. */
export function Rail({
  result,
  levelIndex,
  level,
  actions,
}: {
  readonly result: StudyResult
  readonly levelIndex: number
  readonly level: number
  readonly actions: SheetActions
}) {
  const wanted = useView((state) => state.chosenMethod)
  const chosen = chosenAmong(
    result.profiles.map((profile) => profile.method),
    wanted,
  )
  const shown = useShown(result, chosen)
  const profile = shown?.profile
  const ends = shown?.interval
  const { bars, caption } = useMemo(() => {
    const widths = result.levels.map((_, i) => halfWidth(ends?.lower95_kJ_per_mol[i], ends?.upper95_kJ_per_mol[i]))
    const mean = profile?.mean.Ea_kJ_per_mol ?? null
    return {
      bars: railBars(widths, mean),
      caption: captionOf(widths, mean, shown),
    }
  }, [result, profile, ends, shown])
  const Ea = decimals(profile?.Ea_kJ_per_mol[levelIndex], 1)
  const [lower, upper] = [ends?.lower95_kJ_per_mol[levelIndex], ends?.upper95_kJ_per_mol[levelIndex]]
  const interval = formatInterval(profile?.Ea_kJ_per_mol[levelIndex], lower, upper)
  const r2 = decimals(profile?.r2[levelIndex], 5)
  const status = profile?.status[levelIndex]
  const quantity = levelQuantity(result)
  const programmes = useMemo(() => endProgrammes(result), [result])
  const [slowest = '', fastest = slowest] = programmes.map(({ runs }) => formatAt(meanAtLevel(runs, levelIndex, quantity), quantity))
  const range = programmeRange(programmes.map(({ name }) => name))
  const word = status === undefined || status === 'ok' ? '' : statusWords[status]
  const words = intervalWordsAt(ends ?? null, levelIndex)
  const spoken = [
    formatLevel(level),
    Ea === ''
      ? word
      : `Ea ${Ea}${interval === '' ? '' : `, ${ends === null || ends === undefined ? '' : shortKinds[ends.kind]} interval ${interval}`} kJ/mol`,
    words === null ? '' : `interval: ${words}`,
    slowest === '' || fastest === '' ? '' : `${slowest} to ${fastest} ${quantity.unit} at ${range.replace('…', 'to')}`,
  ]
    .filter((part) => part !== '')
    .join(', ')

  return (
    <LevelRail levels={result.levels} index={levelIndex} bars={bars} caption={caption} spoken={spoken} onMove={actions.moveLevel}>
      <p className="readout-energy">
        {profile !== undefined && <span className="readout-method">{profile.label}</span>}
        {Ea === '' ? (
          <span className="is-word">{word}</span>
        ) : (
          <>
            Ea{' '}
            <strong>
              <Remarked remark={words === null ? null : `interval: ${words}`}>
                {formatWithInterval(profile?.Ea_kJ_per_mol[levelIndex], lower, upper)}
              </Remarked>
            </strong>{' '}
            kJ/mol
          </>
        )}
        {r2 !== '' && (
          <>
            {' '}
            <span className="readout-r2">
              r² <strong>{r2}</strong>
            </span>
          </>
        )}
      </p>
      <p title="Slowest to fastest programme, each as the mean over its replicates">
        {quantity.symbol} <strong>{slowest === '' ? 'not reached' : slowest}</strong> …{' '}
        <strong>{fastest === '' ? 'not reached' : fastest}</strong> {quantity.unit}
        <span className="readout-programmes"> at {range}</span>
      </p>
    </LevelRail>
  )
}

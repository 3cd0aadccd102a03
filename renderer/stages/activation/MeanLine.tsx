import type { ProfileResult } from '../../../shared-kinetics/contract/study-result.ts'
import { levelsOfMean } from '../../../shared-kinetics/figure/levels-of-mean.ts'
import { meanCaution } from '../../../shared-kinetics/figure/mean-not-alone.ts'
import { decimals } from '../../sheet/format.ts'
import { parseConversion } from '../../sheet/parse-conversion.ts'
import { TypedField } from '../../sheet/TypedField.tsx'
import type { ActivationProps } from './ActivationStage.tsx'
import { meanShown } from './mean-shown.ts'

/** The mean of Ea over a range of conversion with its own interval, and how far apart the levels in it lie. */
export function MeanLine({ shown, result, document, actions }: ActivationProps) {
  const { profile } = shown
  const [from, to] = document.settings.meanRange
  const mean = meanShown(shown)
  const ends = endsOfMean(profile, result.levels)
  // Such a mean must not stand out, and says so itself: it may be read or photographed without the finding.
  const isDoubtful = meanCaution(result.findings) !== null
  const set = (meanRange: [number, number]): void => {
    if (meanRange[0] < meanRange[1]) actions.change({ kind: 'set-mean-range', meanRange })
  }
  return (
    <div className="mean-line">
      <span>Mean over α</span>
      <TypedField
        label="Mean from conversion"
        hideLabel
        text={decimals(from, 2)}
        parse={parseConversion}
        onCommit={(value) => set([value, to])}
      />
      <span>to</span>
      <TypedField
        label="Mean to conversion"
        hideLabel
        text={decimals(to, 2)}
        parse={parseConversion}
        onCommit={(value) => set([from, value])}
      />
      {mean === null ? (
        <span>not to be had: no level there has a number.</span>
      ) : (
        <output>
          {isDoubtful ? mean.text : <strong>{mean.text}</strong>} kJ/mol
          {isDoubtful && <span className="not-alone">, not to be quoted alone</span>}
          {mean.words !== '' && ` (${mean.words})`}; {levelsOfMean(profile.mean)}
          {ends !== null && `, ${decimals(ends[0], 1)} to ${decimals(ends[1], 1)}`}
          {mean.remark !== null && <span className="mean-remark">Interval of the mean: {mean.remark}.</span>}
        </output>
      )}
    </div>
  )
}

const rounding = 1e-9

/** The least and the greatest Ea among the levels that the mean rests on; null where there are fewer than two. */
function endsOfMean({ mean, Ea_kJ_per_mol: Ea }: ProfileResult, levels: readonly number[]): readonly [number, number] | null {
  const used = levels.flatMap((level, i) => {
    const value = Ea[i] ?? null
    return value !== null && value > 0 && level >= mean.from - rounding && level <= mean.to + rounding ? [value] : []
  })
  return used.length < 2 ? null : [Math.min(...used), Math.max(...used)]
}

import type { ReactNode } from 'react'
import { formatLevel } from './format.ts'
import type { RailBar } from './rail-bars.ts'
import { RailStrip } from './RailStrip.tsx'

export interface LevelRailProps {
  readonly levels: readonly number[]
  readonly index: number
  readonly bars: readonly RailBar[]
  /** What the bars mean, line by line. */
  readonly caption?: readonly string[]
  /** What stands at this level, in words, for people who hear the screen. */
  readonly spoken: string
  readonly onMove: (index: number) => void
  /** Numbers at the current level. */
  readonly children: ReactNode
}

const marks = Array.from({ length: 11 }, (_, i) => ({ share: i / 10, text: (i / 10).toFixed(1) }))

/** The level rail: alpha from 0 to 1, its handle shared by every chart and table. */
export function LevelRail({ levels, index, bars, caption = [], spoken, onMove, children }: LevelRailProps) {
  const level = levels[index] ?? 0
  return (
    <RailStrip
      name="Level rail"
      label="Conversion α"
      number={formatLevel(level)}
      caption={caption}
      slider={{ name: 'Conversion level', least: levels[0] ?? 0, greatest: levels.at(-1) ?? 1, now: level, spoken }}
      stops={levels.map((one, i) => ({ key: String(one), share: one, bar: bars[i] }))}
      index={index}
      marks={marks}
      onMove={onMove}
    >
      {children}
    </RailStrip>
  )
}

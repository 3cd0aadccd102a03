/** A figure as plain data. The screen draws it with Chart.js, the exports as SVG; neither adds anything that is not in here. */
export interface Figure {
  /** Stable name, also used for file names: `signals`, `straight-lines`, `phi`, `activation-energy`. */
  readonly id: string
  readonly title: string
  /** One sentence of what is drawn; also the text alternative for screen readers. */
  readonly description: string
  readonly x: Axis
  readonly y: Axis
  readonly marks: readonly Mark[]
  /** What a reader must know beside the picture, e.g. points that lie beyond an axis; stands beneath it in every medium. */
  readonly note?: string
}

export interface Axis {
  /** e.g. `Ea` */
  readonly label: string
  /** e.g. `kJ/mol`; empty for a pure number. */
  readonly unit: string
  /** Fixed ends; null lets the marks decide. */
  readonly min: number | null
  readonly max: number | null
  /** A second reading of the same axis along the opposite edge, e.g. °C above 1000/T. */
  readonly second: {
    readonly label: string
    readonly unit: string
    readonly ticks: readonly { readonly at: number; readonly text: string }[]
  } | null
}

/** What a mark stands for; each medium has its own colours for it. */
export type Tone =
  /** `place` 0 (slowest) to 1 (fastest) on the scale of heating rates; `index` picks the run's own marker. */
  | { readonly kind: 'run'; readonly place: number; readonly index: number }
  /** `index` picks line style and marker of a method; the first is the chosen one. */
  | { readonly kind: 'method'; readonly index: number }
  | { readonly kind: 'ink' }
  | { readonly kind: 'faint' }
  | { readonly kind: 'accent' }

export type Mark =
  | {
      readonly kind: 'line'
      readonly name: string
      readonly tone: Tone
      readonly x: ArrayLike<number>
      readonly y: ArrayLike<number>
      readonly dash?: 'dashed' | 'dotted'
    }
  | {
      readonly kind: 'points'
      readonly name: string
      readonly tone: Tone
      readonly x: ArrayLike<number>
      readonly y: ArrayLike<number>
      readonly joined: boolean
      readonly lower?: ArrayLike<number>
      readonly upper?: ArrayLike<number>
    }
  | {
      readonly kind: 'band'
      readonly name: string
      readonly tone: Tone
      readonly x: ArrayLike<number>
      readonly lower: ArrayLike<number>
      readonly upper: ArrayLike<number>
    }
  | {
      readonly kind: 'rule'
      readonly name: string
      readonly tone: Tone
      /** The direction it runs in: `x` is horizontal, at y = `at`; `y` is vertical, at x = `at`. */
      readonly along: 'x' | 'y'
      readonly at: number
      readonly dash?: 'dashed' | 'dotted'
    }

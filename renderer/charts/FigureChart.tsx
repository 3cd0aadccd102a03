import { Chart } from 'chart.js'
import { useEffect, useId, useRef, useState, type KeyboardEvent } from 'react'
import { Button } from 'react-aria-components'
import type { Figure, Mark } from '../../shared-kinetics/figure/figure.ts'
import { setAxisText } from './axis-text-plugin.ts'
import type { ChartColours } from './chart-colours.ts'
import { chartOptions, type FigureChartType } from './chart-options.ts'
import { isZoomed, moveRange, type ChartRange, type RangeMove } from './chart-range.ts'
import { chartWords } from './chart-words.ts'
import { copyPicture } from './copy-picture.ts'
import { datasetsOf, type FigurePoint } from './figure-datasets.ts'
import { setOverlay } from './overlay-plugin.ts'

type FigureChartInstance = Chart<FigureChartType, FigurePoint[]>

export interface FigureChartProps {
  readonly figure: Figure
  /** Marks of the current level, drawn over the figure; a new list costs one redraw. */
  readonly overlay: readonly Mark[]
  readonly colours: ChartColours
  /** Index of the run drawn stronger than the others. */
  readonly emphasis?: number | null
  /** Called with the x under a click that was no drag. */
  readonly onPick?: (x: number) => void
  /** Called after a picture was put on the clipboard, or with the reason why not. */
  readonly onCopied: (failure: string | null) => void
}

const moves: Readonly<Record<string, RangeMove>> = {
  '+': 'in',
  '=': 'in',
  '-': 'out',
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
}

/**
 * Draws a figure. The chart lives outside React: a new figure replaces its data and updates it without animation, a new overlay only redraws it.
 * Zoom: wheel, drag, or plus, minus and arrows while it has the focus; 0 shows the whole figure again.
 */
export function FigureChart({ figure, overlay, colours, emphasis = null, onPick, onCopied }: FigureChartProps) {
  const canvasRef = useRef<HTMLCanvasElement>(null)
  const chartRef = useRef<FigureChartInstance | null>(null)
  const wholeRef = useRef<ChartRange | null>(null)
  const pickRef = useRef(onPick)
  const [zoomed, setZoomed] = useState(false)
  const helpId = useId()

  useEffect(() => {
    pickRef.current = onPick
  }, [onPick])

  useEffect(() => {
    const canvas = canvasRef.current
    if (canvas === null) return
    const noteZoom = (): void => setZoomed(showsPart(chartRef.current, wholeRef.current))
    const chart: FigureChartInstance = new Chart(canvas, { type: 'scatter', data: { datasets: [] }, options: { animation: false } })
    chartRef.current = chart
    zoomHandlers.set(chart, noteZoom)
    // Text is measured when the chart is laid out; the sheet's own font may arrive after that.
    void document.fonts.ready.then(() => chartRef.current?.update('none'))
    return () => {
      chart.destroy()
      chartRef.current = null
    }
  }, [])

  useEffect(() => {
    const chart = chartRef.current
    if (chart === null) return
    chart.data.datasets = datasetsOf(figure, colours, emphasis) as FigureChartInstance['data']['datasets']
    const { plugins, ...options } = chartOptions(figure, colours)
    chart.options = {
      ...options,
      plugins: { ...plugins, zoom: zoomOptions(chart, colours) },
      onClick: (event) => pick(chart, event.x, pickRef.current),
    }
    setAxisText(chart, { figure, colours })
    chart.update('none')
    wholeRef.current = rangeOf(chart)
    setZoomed(false)
  }, [figure, colours, emphasis])

  useEffect(() => {
    const chart = chartRef.current
    if (chart === null) return
    setOverlay(chart, { marks: overlay, colours })
    chart.draw()
  }, [overlay, colours])

  const show = (range: ChartRange): void => {
    const { current: chart } = chartRef
    if (chart === null) return
    setRange(chart, range)
    setZoomed(showsPart(chart, wholeRef.current))
  }

  const showWhole = (): void => {
    if (wholeRef.current !== null) show(wholeRef.current)
  }

  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.target !== event.currentTarget || event.altKey) return
    if ((event.ctrlKey || event.metaKey) && event.key.toLowerCase() === 'c') {
      event.preventDefault()
      copy()
      return
    }
    if (event.ctrlKey || event.metaKey) return
    const move = moves[event.key]
    const { current: chart } = chartRef
    if (event.key === '0') showWhole()
    else if (move === undefined || chart === null || wholeRef.current === null) return
    else show(moveRange(rangeOf(chart), move, wholeRef.current))
    event.preventDefault()
  }

  const copy = (): void => {
    const { current: canvas } = canvasRef
    if (canvas === null) return
    copyPicture(canvas, colours.paper).then(
      () => onCopied(null),
      (error: unknown) => onCopied(error instanceof Error ? error.message : String(error)),
    )
  }

  return (
    <div className="chart" data-figure={figure.id}>
      <div className="chart-actions">
        {zoomed && (
          <Button className="chart-action is-steady" onPress={showWhole}>
            Show whole
          </Button>
        )}
        <Button className="chart-action" onPress={copy} aria-label={`Copy picture of ${figure.title}`}>
          Copy picture
        </Button>
      </div>
      {/* oxlint-disable-next-line jsx-a11y/no-noninteractive-tabindex, jsx-a11y/no-noninteractive-element-interactions -- zoomed and moved by keys */}
      <figure className="chart-area" aria-label={figure.title} aria-describedby={helpId} tabIndex={0} onKeyDown={onKeyDown}>
        {/* oxlint-disable-next-line jsx-a11y/prefer-tag-over-role -- a canvas is an image to those who hear the screen */}
        <canvas ref={canvasRef} role="img" aria-label={figure.description} />
      </figure>
      <p role="note" className="visually-hidden">
        {chartWords(figure, overlay)}
      </p>
      <p id={helpId} className="visually-hidden">
        Plus and minus zoom, arrow keys move, 0 shows the whole figure, Control C copies the picture.
      </p>
    </div>
  )
}

const zoomHandlers = new WeakMap<FigureChartInstance, () => void>()

function zoomOptions(chart: FigureChartInstance, colours: ChartColours) {
  const onZoomComplete = (): void => zoomHandlers.get(chart)?.()
  return {
    zoom: {
      mode: 'xy',
      wheel: { enabled: true, speed: 0.08 },
      drag: { enabled: true, threshold: 8, borderColor: colours.accent, borderWidth: 1, backgroundColor: `${colours.accent}22` },
      onZoomStart: ({ event }: { readonly event: Event }) => !wheelScrolls(event, chart.canvas),
      onZoomComplete,
    },
  } as const
}

/** In a small window the sheet scrolls; a bare wheel is then for that, and with Ctrl for the chart. */
function wheelScrolls(event: Event, canvas: HTMLCanvasElement): boolean {
  if (!(event instanceof WheelEvent) || event.ctrlKey) return false
  for (let element = canvas.parentElement; element !== null; element = element.parentElement) {
    const scrolls = /auto|scroll/.test(getComputedStyle(element).overflowY)
    if (scrolls && element.scrollHeight > element.clientHeight + 1) return true
  }
  return false
}

function pick(chart: FigureChartInstance, left: number | null, onPick: FigureChartProps['onPick']): void {
  const x = left === null ? undefined : chart.scales.x?.getValueForPixel(left)
  if (x !== undefined) onPick?.(x)
}

function rangeOf(chart: FigureChartInstance): ChartRange {
  const { x, y } = chart.scales
  return { x: [x?.min ?? 0, x?.max ?? 1], y: [y?.min ?? 0, y?.max ?? 1] }
}

const showsPart = (chart: FigureChartInstance | null, whole: ChartRange | null): boolean =>
  chart !== null && whole !== null && isZoomed(rangeOf(chart), whole)

function setRange(chart: FigureChartInstance, range: ChartRange): void {
  const { scales } = chart.options
  for (const axis of ['x', 'y'] as const) {
    const scale = scales?.[axis]
    if (scale === undefined) continue
    ;[scale.min, scale.max] = range[axis]
  }
  chart.update('none')
}

import { Chart, Filler, LineElement, LinearScale, PointElement, ScatterController, Tooltip } from 'chart.js'
import { PointWithErrorBar, ScatterWithErrorBarsController } from 'chartjs-chart-error-bars'
import annotationPlugin from 'chartjs-plugin-annotation'
import zoomPlugin from 'chartjs-plugin-zoom'
import { axisTextPlugin } from './axis-text-plugin.ts'
import { overlayPlugin } from './overlay-plugin.ts'

/** Only what figures are made of is registered, so that only that is bundled. */
export function registerCharts(): void {
  Chart.register(
    ScatterController,
    ScatterWithErrorBarsController,
    PointWithErrorBar,
    PointElement,
    LineElement,
    LinearScale,
    Filler,
    Tooltip,
    annotationPlugin,
    zoomPlugin,
    overlayPlugin,
    axisTextPlugin,
  )
}

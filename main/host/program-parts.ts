import { demoSeries } from '../demo/demo-series.ts'
import { exportRateConstants } from '../export/export-rate-constants.ts'
import { exportResults } from '../export/export-results.ts'
import type { ProgramParts } from './handlers/handler-table.ts'

/** The program's own demo series and exports. */
export const programParts: ProgramParts = { demoSeries, exportResults, exportRateConstants }

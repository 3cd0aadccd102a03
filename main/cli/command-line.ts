// All that the command line is made of, as the one script that `cli.ts` loads.
export { demoSeries } from '../demo/demo-series.ts'
export { run } from './run.ts'

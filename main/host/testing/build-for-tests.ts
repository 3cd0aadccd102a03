import { mkdtemp, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { build } from 'vite'

/**
 * Bundles one file for Node, since Node 20 cannot run TypeScript in a thread or a process of its own. For tests.
 * @returns where the bundle lies, and the call that takes it away again
 */
export async function buildForTests(entry: URL): Promise<{ readonly url: URL; readonly path: string; remove(): Promise<void> }> {
  // Inside the checkout, so that packages are found from it.
  const folder = await mkdtemp(join(import.meta.dirname, '../../../node_modules/.rampfold-test-'))
  await build({
    configFile: false,
    logLevel: 'error',
    build: {
      ssr: entry.pathname,
      target: 'node20.19',
      outDir: folder,
      emptyOutDir: false,
      rolldownOptions: { output: { entryFileNames: 'entry.js' } },
    },
  })
  const path = join(folder, 'entry.js')
  return { url: pathToFileURL(path), path, remove: async () => rm(folder, { recursive: true, force: true }) }
}

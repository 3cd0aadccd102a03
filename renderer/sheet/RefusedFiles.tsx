import { Button } from 'react-aria-components'
import type { RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import { count } from './format.ts'

/** Files that could not be used: where, why, and what to do about it. */
export function RefusedFiles({ files, onDismiss }: { readonly files: readonly RefusedFile[]; readonly onDismiss: () => void }) {
  return (
    <section className="refused" role="alert" aria-labelledby="refused-title">
      <div className="refused-head">
        <h2 id="refused-title">{count(files.length, 'file')} not used</h2>
        <Button className="text-button" onPress={onDismiss}>
          Dismiss
        </Button>
      </div>
      <ul>
        {files.map((file, i) => (
          // oxlint-disable-next-line react/no-array-index-key -- the same file may be refused twice, and the list never changes in place
          <li key={i}>
            <strong>{file.fileName}</strong>
            {file.line !== null && <span className="refused-line">, line {file.line}</span>}
            <span className="refused-reason">{file.reason}</span> <span className="refused-remedy">{file.remedy}</span>
          </li>
        ))}
      </ul>
    </section>
  )
}

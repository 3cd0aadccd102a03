import { Button } from 'react-aria-components'
import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'
import type { SheetActions } from '../stages/stage-props.ts'
import { count, formatMoment } from '../sheet/format.ts'
import { Half } from '../sheet/Half.tsx'
import { useServices } from '../state/services.ts'
import { Preview } from './Preview.tsx'

/** A study without runs: what to drop, and what comes of it. */
export function EmptySheet({ actions, recent }: { readonly actions: SheetActions; readonly recent: readonly RecentStudy[] }) {
  return (
    <>
      <Half
        side="evidence"
        title="Drop the exports of one material here"
        note="DSC or TGA runs at three or more heating rates, as the instrument wrote them."
      >
        <div className="empty">
          <div className="empty-steps">
            <Button className="button button-main" onPress={actions.openFiles}>
              Open files…
            </Button>
            <Button className="button" onPress={actions.openDemo}>
              Open the demo series
            </Button>
          </div>
          <dl className="empty-facts">
            <dt>Files</dt>
            <dd>
              Delimited text (.csv, .txt, .tsv), one run a file or several side by side; comma, semicolon or tab; decimal point or comma. Or
              a saved study.
            </dd>
            <dt>Columns</dt>
            <dd>
              Temperature, and time if there is one, with mass, heat flow, heat release rate or conversion. Names and units are read from
              the headings.
            </dd>
            <dt>Heating rate</dt>
            <dd>
              Measured from temperature against time. Where a file has no time, it is taken from the heading, the preamble or the name, or
              asked.
            </dd>
          </dl>
          <RateConstantsEntry actions={actions} />
          <Sample />
          {recent.length > 0 && (
            <nav aria-labelledby="recent-title" className="empty-recent">
              <h3 id="recent-title">Recent studies</h3>
              <ul>
                {recent.slice(0, 5).map((study) => (
                  <li key={study.studyId}>
                    <Button className="link-button" onPress={() => actions.openRecent(study.studyId)}>
                      {study.name}
                    </Button>{' '}
                    <span className="soft">
                      {study.rateConstants > 0 && study.runs === 0 ? count(study.rateConstants, 'rate constant') : count(study.runs, 'run')}
                      , {formatMoment(study.changedAt)}
                    </span>
                  </li>
                ))}
              </ul>
            </nav>
          )}
        </div>
      </Half>
      <Half
        side="result"
        title="What comes of it"
        note="Activation energy against conversion, with the interval that the runs support, and what is wrong with them if something is."
      >
        <Preview />
        <p className="empty-promise">
          Every file is read on this machine and nothing is sent anywhere. A file that cannot be understood is refused with its line and the
          reason; nothing is guessed in silence.
        </p>
      </Half>
    </>
  )
}

/** The other thing a study may hold. */
function RateConstantsEntry({ actions }: { readonly actions: SheetActions }) {
  const { session } = useServices()
  return (
    <section className="empty-rates" aria-labelledby="rates-title">
      <h3 id="rates-title">Rate constants against temperature instead?</h3>
      <p>Paste a table here with Ctrl+V, drop its file, or</p>
      <Button className="link-button" onPress={actions.typeRateConstants}>
        type it
      </Button>
      <span aria-hidden="true">·</span>
      <Button className="link-button" onPress={() => void session.offerTable({ kind: 'text', text: '' })}>
        paste it as text
      </Button>
    </section>
  )
}

/** How an export may look. */
function Sample() {
  return (
    <figure className="sample">
      <figcaption>An export that is understood as it stands</figcaption>
      <table>
        <tbody>
          <tr>
            <th scope="col">Time (min)</th>
            <th scope="col">Temperature (°C)</th>
            <th scope="col">Mass (mg)</th>
          </tr>
          <tr>
            <td>0.00</td>
            <td>30.12</td>
            <td>8.431</td>
          </tr>
          <tr>
            <td>0.05</td>
            <td>30.63</td>
            <td>8.431</td>
          </tr>
          <tr>
            <td>0.10</td>
            <td>31.14</td>
            <td>8.430</td>
          </tr>
        </tbody>
      </table>
    </figure>
  )
}

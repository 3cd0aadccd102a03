import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import type { HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { registerCharts } from '../charts/register-charts.ts'
import { ServicesContext, type Services } from '../state/services.ts'
import { createStudySession } from '../state/study-session.ts'
import { createViewStore } from '../state/view-store.ts'
import { App } from './App.tsx'
import { storedTheme } from './theme.ts'

/** Puts the sheet into an element, over any way to a host. */
export function mount(element: HTMLElement, transport: HostTransport): Services {
  registerCharts()
  const services: Services = { session: createStudySession(transport), view: createViewStore() }
  services.view.setState({ theme: storedTheme() })
  createRoot(element).render(
    <StrictMode>
      <ServicesContext value={services}>
        <App />
      </ServicesContext>
    </StrictMode>,
  )
  void services.session.start()
  return services
}

import { useMemo, useSyncExternalStore } from 'react'
import { chartColoursOf, type ChartColours } from '../charts/chart-colours.ts'
import type { Paper } from '../../shared-kinetics/figure/run-scale.ts'
import type { Theme } from '../state/view-store.ts'

const themeKey = 'rampfold.theme'

/** The theme chosen last time on this machine; a window that may not store anything follows the system. */
export function storedTheme(): Theme {
  try {
    const stored = localStorage.getItem(themeKey)
    return stored === 'light' || stored === 'dark' ? stored : 'system'
  } catch {
    return 'system'
  }
}

export function storeTheme(theme: Theme): void {
  try {
    localStorage.setItem(themeKey, theme)
  } catch {
    // A window without storage still shows the theme; it only will not remember it.
  }
}

/** The paper that is on, and its colours for charts. Sets `data-theme`, by which the stylesheets choose their tokens. */
export function usePaper(theme: Theme): { readonly paper: Paper; readonly colours: ChartColours } {
  const systemIsDark = useSyncExternalStore(subscribeToSystem, () => darkQuery().matches)
  const paper: Paper = theme === 'system' ? (systemIsDark ? 'dark' : 'light') : theme
  // Laid during rendering, because charts below read their colours from it in the same pass; laying the same paper twice changes nothing.
  const colours = useMemo(() => layPaper(paper), [paper])
  return { paper, colours }
}

function layPaper(paper: Paper): ChartColours {
  document.documentElement.dataset.theme = paper
  return chartColoursOf(document.documentElement, paper)
}

const darkQuery = (): MediaQueryList => window.matchMedia('(prefers-color-scheme: dark)')

function subscribeToSystem(changed: () => void): () => void {
  const query = darkQuery()
  query.addEventListener('change', changed)
  return () => query.removeEventListener('change', changed)
}

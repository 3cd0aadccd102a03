import { createContext, useContext } from 'react'
import { useStore } from 'zustand'
import type { ChartColours } from '../charts/chart-colours.ts'
import type { StudySession } from './study-session.ts'
import type { StudyState } from './study-state.ts'
import type { ViewState, ViewStore } from './view-store.ts'

/** What every part of the sheet works with, handed down once. */
export interface Services {
  readonly session: StudySession
  readonly view: ViewStore
}

export const ServicesContext = createContext<Services | null>(null)
/** The colours of the paper that is on; changes with the theme. */
export const ColoursContext = createContext<ChartColours | null>(null)

export function useServices(): Services {
  const services = useContext(ServicesContext)
  if (services === null) throw new Error('This part of the sheet stands outside of it.')
  return services
}

export function useColours(): ChartColours {
  const colours = useContext(ColoursContext)
  if (colours === null) throw new Error('This part of the sheet has no paper.')
  return colours
}

export const useStudy = <T>(select: (state: StudyState) => T): T => useStore(useServices().session.store, select)
export const useView = <T>(select: (state: ViewState) => T): T => useStore(useServices().view, select)

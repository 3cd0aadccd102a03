import { zeroCelsius_K } from './constants.ts'
import type { Quantity } from './quantity.ts'

export const celsiusToKelvin = (celsius: number): Quantity<'K'> => (celsius + zeroCelsius_K) as Quantity<'K'>
export const kelvinToCelsius = (kelvin: number): number => kelvin - zeroCelsius_K
export const fahrenheitToKelvin = (fahrenheit: number): Quantity<'K'> => ((fahrenheit - 32) / 1.8 + zeroCelsius_K) as Quantity<'K'>
export const perMinuteToPerSecond = (kelvinPerMinute: number): Quantity<'K/s'> => (kelvinPerMinute / 60) as Quantity<'K/s'>
export const perSecondToPerMinute = (kelvinPerSecond: number): number => kelvinPerSecond * 60
export const joulesToKilojoules = (joules: number): number => joules / 1000

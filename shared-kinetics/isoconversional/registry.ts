import { friedman, friedmanInfo } from './friedman.ts'
import { isothermalIntegral, isothermalIntegralInfo } from './isothermal-integral.ts'
import { kissingerAkahiraSunose, kissingerAkahiraSunoseInfo } from './kissinger-akahira-sunose.ts'
import { ozawaFlynnWall, ozawaFlynnWallInfo } from './ozawa-flynn-wall.ts'
import type { IsoconversionalMethod, MethodId, MethodInfo } from './result.ts'
import { starink, starinkInfo } from './starink.ts'
import { vyazovkin, vyazovkinInfo } from './vyazovkin.ts'

/** Every isoconversional method the program can run, by id. Which of them apply to a series is told by `info.appliesTo`. */
export const methods: Readonly<Record<MethodId, { readonly info: MethodInfo; readonly run: IsoconversionalMethod }>> = {
  friedman: { info: friedmanInfo, run: friedman },
  ofw: { info: ozawaFlynnWallInfo, run: ozawaFlynnWall },
  kas: { info: kissingerAkahiraSunoseInfo, run: kissingerAkahiraSunose },
  starink: { info: starinkInfo, run: starink },
  vyazovkin: { info: vyazovkinInfo, run: vyazovkin },
  'isothermal-integral': { info: isothermalIntegralInfo, run: isothermalIntegral },
}

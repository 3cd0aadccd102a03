import { astmE1641, astmE1641Info } from './astm-e1641.ts'
import { friedman, friedmanInfo } from './friedman.ts'
import { iso11358Part2, iso11358Part2Info } from './iso-11358-2.ts'
import { isothermalIntegral, isothermalIntegralInfo } from './isothermal-integral.ts'
import { kissingerAkahiraSunose, kissingerAkahiraSunoseInfo } from './kissinger-akahira-sunose.ts'
import { ozawaFlynnWall, ozawaFlynnWallInfo } from './ozawa-flynn-wall.ts'
import { ozawaFlynnWallCorrected, ozawaFlynnWallCorrectedInfo } from './ozawa-flynn-wall-corrected.ts'
import type { IsoconversionalMethod, MethodId, MethodInfo } from './result.ts'
import { starink1996, starink1996Info } from './starink-1996.ts'
import { starink, starinkInfo } from './starink.ts'
import { tang, tangInfo } from './tang.ts'
import { vyazovkinIncremental, vyazovkinIncrementalInfo } from './vyazovkin-incremental.ts'
import { vyazovkin, vyazovkinInfo } from './vyazovkin.ts'

/** Every isoconversional method the program can run, by id. Which of them apply to a series is told by `info.appliesTo`. */
export const methods: Readonly<Record<MethodId, { readonly info: MethodInfo; readonly run: IsoconversionalMethod }>> = {
  friedman: { info: friedmanInfo, run: friedman },
  ofw: { info: ozawaFlynnWallInfo, run: ozawaFlynnWall },
  'ofw-corrected': { info: ozawaFlynnWallCorrectedInfo, run: ozawaFlynnWallCorrected },
  kas: { info: kissingerAkahiraSunoseInfo, run: kissingerAkahiraSunose },
  starink: { info: starinkInfo, run: starink },
  vyazovkin: { info: vyazovkinInfo, run: vyazovkin },
  'vyazovkin-incremental': { info: vyazovkinIncrementalInfo, run: vyazovkinIncremental },
  'isothermal-integral': { info: isothermalIntegralInfo, run: isothermalIntegral },
  'starink-1996': { info: starink1996Info, run: starink1996 },
  tang: { info: tangInfo, run: tang },
  'astm-e1641': { info: astmE1641Info, run: astmE1641 },
  'iso-11358-2': { info: iso11358Part2Info, run: iso11358Part2 },
}

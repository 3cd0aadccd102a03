import '../styles/fonts.css'
import '../styles/tokens.css'
import '../styles/base.css'
import '../styles/controls.css'
import '../styles/top-line.css'
import '../styles/sheet.css'
import '../styles/tables.css'
import '../styles/charts.css'
import '../styles/uncertainty.css'
import '../styles/rail.css'
import '../styles/rate-constants.css'
import '../styles/empty.css'
import { chooseTransport } from '../transport/choose-transport.ts'
import { mount } from './mount.tsx'

const element = document.getElementById('sheet')
if (element === null) throw new Error('The page has no place for the sheet.')
mount(element, chooseTransport(window))

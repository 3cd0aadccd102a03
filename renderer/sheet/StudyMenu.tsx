import { Button, Header, Keyboard, Menu, MenuItem, MenuSection, MenuTrigger, Popover, Separator, Text } from 'react-aria-components'
import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'
import type { Theme } from '../state/view-store.ts'
import type { SheetActions } from '../stages/stage-props.ts'
import { count, formatMoment } from './format.ts'

const shownRecent = 8

/** Everything that concerns the study as a whole. */
export function StudyMenu({
  recent,
  currentStudyId,
  continuedFrom,
  hasResults,
  hasRuns,
  actions,
  onOpen,
}: {
  readonly recent: readonly RecentStudy[]
  readonly currentStudyId: string
  /** When it was last changed before this window opened on it; null for one that was begun or opened here. */
  readonly continuedFrom: string | null
  readonly hasResults: boolean
  readonly hasRuns: boolean
  readonly actions: SheetActions
  readonly onOpen: () => void
}) {
  const others = recent.filter((study) => study.studyId !== currentStudyId).slice(0, shownRecent)
  const disabled = [...(hasResults ? [] : ['export']), ...(hasRuns ? [] : ['copy', 'save'])]
  return (
    <MenuTrigger onOpenChange={(open) => open && onOpen()}>
      <Button className="text-button menu-button">Study</Button>
      <Popover className="popover" placement="bottom end">
        <Menu className="menu" disabledKeys={disabled}>
          <MenuItem className="menu-item" onAction={actions.openFiles} textValue="Open files…">
            <Text slot="label">Open files…</Text>
            <Keyboard>{shortcut('O')}</Keyboard>
          </MenuItem>
          <MenuItem className="menu-item" onAction={actions.openDemo} textValue="Open the demo series">
            <Text slot="label">Open the demo series</Text>
          </MenuItem>
          <MenuItem className="menu-item" onAction={actions.newStudy} textValue="New study">
            <Text slot="label">New study</Text>
            {continuedFrom !== null && <Text slot="description">instead of the one continued from {formatMoment(continuedFrom)}</Text>}
          </MenuItem>
          <Separator className="menu-rule" />
          <MenuItem id="save" className="menu-item" onAction={actions.saveCopy} textValue="Save a copy">
            <Text slot="label">Save a copy</Text>
            <Keyboard>{shortcut('S')}</Keyboard>
          </MenuItem>
          <MenuItem id="export" className="menu-item" onAction={actions.exportTable} textValue="Export table (CSV)">
            <Text slot="label">Export table (CSV)</Text>
          </MenuItem>
          <MenuItem id="copy" className="menu-item" onAction={actions.copyTable} textValue="Copy table">
            <Text slot="label">Copy table</Text>
          </MenuItem>
          {others.length > 0 && (
            <MenuSection className="menu-section">
              <Header className="menu-heading">Recent</Header>
              {others.map((study) => (
                <MenuItem
                  key={study.studyId}
                  id={study.studyId}
                  className="menu-item"
                  textValue={study.name}
                  onAction={() => actions.openRecent(study.studyId)}
                >
                  <Text slot="label">{study.name}</Text>
                  <Text slot="description">
                    {study.rateConstants > 0 && study.runs === 0 ? count(study.rateConstants, 'rate constant') : count(study.runs, 'run')},{' '}
                    {formatMoment(study.changedAt)}
                  </Text>
                </MenuItem>
              ))}
            </MenuSection>
          )}
        </Menu>
      </Popover>
    </MenuTrigger>
  )
}

const themes: readonly { readonly id: Theme; readonly text: string }[] = [
  { id: 'system', text: 'As the system' },
  { id: 'light', text: 'Light' },
  { id: 'dark', text: 'Dark' },
]

export function ThemeMenu({ theme, onChange }: { readonly theme: Theme; readonly onChange: (theme: Theme) => void }) {
  return (
    <MenuTrigger>
      <Button className="text-button menu-button">Theme</Button>
      <Popover className="popover" placement="bottom end">
        <Menu
          className="menu"
          selectionMode="single"
          disallowEmptySelection
          selectedKeys={[theme]}
          onSelectionChange={(keys) => {
            const chosen = themes.find((one) => keys !== 'all' && keys.has(one.id))
            if (chosen !== undefined) onChange(chosen.id)
          }}
        >
          {themes.map((one) => (
            <MenuItem key={one.id} id={one.id} className="menu-item" textValue={one.text}>
              <Text slot="label">{one.text}</Text>
            </MenuItem>
          ))}
        </Menu>
      </Popover>
    </MenuTrigger>
  )
}

const shortcut = (key: string): string => (/mac/i.test(navigator.userAgent) ? `⌘${key}` : `Ctrl+${key}`)

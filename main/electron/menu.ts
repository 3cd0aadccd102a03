import { Menu, type MenuItemConstructorOptions } from 'electron'

/** Undo and redo belong to the study and are the page's own keys; the menu must not take them. */
export function menuTemplate(platform: string): MenuItemConstructorOptions[] {
  return [
    ...(platform === 'darwin' ? [{ role: 'appMenu' } as const] : []),
    { label: 'File', submenu: [platform === 'darwin' ? { role: 'close' } : { role: 'quit' }] },
    { label: 'Edit', submenu: [{ role: 'cut' }, { role: 'copy' }, { role: 'paste' }, { role: 'selectAll' }] },
    {
      label: 'View',
      submenu: [{ role: 'resetZoom' }, { role: 'zoomIn' }, { role: 'zoomOut' }, { type: 'separator' }, { role: 'togglefullscreen' }],
    },
    { role: 'windowMenu' },
  ]
}

export function setMenu(platform: string): void {
  Menu.setApplicationMenu(Menu.buildFromTemplate(menuTemplate(platform)))
}

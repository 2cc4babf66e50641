import { describe, expect, it } from 'vitest'
import { windowOptions, windowTitle } from '../../app/windowOptions'

describe('windowOptions', () => {
  it('isolates and sandboxes the page and gives it no Node', () => {
    expect(windowOptions({ preload: '/app/preload.cjs', icon: null, packaged: true })).toEqual({
      title: 'Ringwright',
      width: 1360,
      height: 860,
      minWidth: 1024,
      minHeight: 640,
      show: false,
      webPreferences: {
        preload: '/app/preload.cjs',
        contextIsolation: true,
        sandbox: true,
        nodeIntegration: false,
        nodeIntegrationInWorker: false,
        nodeIntegrationInSubFrames: false,
        webviewTag: false,
        webSecurity: true,
        allowRunningInsecureContent: false,
        experimentalFeatures: false,
        navigateOnDragDrop: false,
        safeDialogs: true,
        spellcheck: false,
        devTools: false,
      },
    })
  })

  it('shows the development tools only unpackaged', () => {
    expect(windowOptions({ preload: 'p', icon: 'i.png', packaged: false })).toMatchObject({
      icon: 'i.png',
      webPreferences: { devTools: true },
    })
  })
})

describe('windowTitle', () => {
  it('marks unsaved changes where the platform does not', () => {
    expect(windowTitle('Ring', true, 'linux')).toBe('• Ring – Ringwright')
    expect(windowTitle('Ring', false, 'linux')).toBe('Ring – Ringwright')
    expect(windowTitle('Ring', true, 'darwin')).toBe('Ring – Ringwright')
  })
})

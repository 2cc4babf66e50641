/**
 * How the desktop packages are made: what goes in, what they are called, which switches of the runtime are closed for good, and
 * what opens a plan.
 */
import { readFileSync } from 'node:fs'
import { copyFile } from 'node:fs/promises'
import path from 'node:path'
import { NOTICES_FILE } from './scripts/notices.mjs'
import { inProject } from './scripts/root.mjs'

/** Installed version of the runtime, so that nothing is guessed from a range. */
const { version: electronVersion } = JSON.parse(
  readFileSync(inProject('node_modules', 'electron', 'package.json'), 'utf8'),
)

/** The one name by which systems know the program; its task bar entry in Windows goes by it too (app/program.ts). */
export const APP_ID = 'ringwright.desktop'

export const PLAN_MIME_TYPE = 'application/vnd.ringwright.plan+json'

/** Everything inside app.asar. The headless runner and the loopback server are for a clone: the window needs neither. */
export const PACKED_FILES = ['package.json', 'dist/app/main.mjs', 'dist/app/preload.cjs', 'dist/renderer/**/*']

/** Switches in the runtime itself: they hold whatever an environment variable or a command line says. */
export const FUSES = /** @type {const} */ ({
  runAsNode: false,
  enableNodeOptionsEnvironmentVariable: false,
  enableNodeCliInspectArguments: false,
  enableCookieEncryption: false,
  enableEmbeddedAsarIntegrityValidation: true,
  onlyLoadAppFromAsar: true,
  loadBrowserProcessSpecificV8Snapshot: false,
  grantFileProtocolExtraPrivileges: false,
})

/** There is no page or mailbox of the project; deb packages must name one, and this ending is reserved for what is not there. */
const NO_ADDRESS = 'ringwright.invalid'

/** Our terms go where the runtime's are. Files named as extra ones would be taken out of app.asar, where the window reads them. */
const TERMS = /** @type {const} */ ([
  [inProject('dist', 'renderer', NOTICES_FILE), 'NOTICES.txt'],
  [inProject('LICENSE'), 'LICENSE.ringwright.txt'],
])

const BOTH = /** @type {const} */ (['x64', 'arm64'])

/** @type {import('electron-builder').Configuration} */
export const PACKAGING = {
  appId: APP_ID,
  productName: 'Ringwright',
  artifactName: '${productName}-${version}-${os}-${arch}.${ext}',
  copyright: 'Copyright © 2026 the Ringwright authors',
  directories: { output: 'release', buildResources: 'build/packaging' },
  electronVersion,
  files: PACKED_FILES,
  asar: true,
  extraMetadata: { homepage: `https://${NO_ADDRESS}/`, desktopName: 'ringwright.desktop' },
  // The window speaks English; the runtime's other languages would only weigh.
  electronLanguages: ['en-US'],
  // The changed runtime needs its signature anew, which macOS alone can make.
  electronFuses: { ...FUSES, resetAdHocDarwinSignature: process.platform === 'darwin' },
  // No package of ours is native, and none is left outside the bundles.
  npmRebuild: false,
  nodeGypRebuild: false,
  // Nothing is uploaded, and the program asks no server for news.
  publish: null,
  async afterPack({ packager, appOutDir, electronPlatformName }) {
    const folder = electronPlatformName === 'darwin' ? packager.getResourcesDir(appOutDir) : appOutDir
    for (const [from, name] of TERMS) await copyFile(from, path.join(folder, name))
  },

  linux: {
    target: ['AppImage', 'deb'].map((target) => ({ target, arch: [...BOTH] })),
    // Elsewhere this would also be the name that people see.
    executableName: 'ringwright',
    icon: 'build/icons/linux',
    category: 'Science',
    synopsis: 'Sizes vortex-ring pulses',
    maintainer: `the Ringwright authors <authors@${NO_ADDRESS}>`,
    syncDesktopName: true,
    fileAssociations: [
      { ext: 'ringwright.json', name: 'Ringwright plan', description: 'Ringwright plan', mimeType: PLAN_MIME_TYPE },
    ],
  },
  mac: {
    target: ['dmg', 'zip'].map((target) => ({ target, arch: [...BOTH] })),
    icon: 'build/icons/icon.icns',
    category: 'public.app-category.productivity',
    minimumSystemVersion: '13.0',
    hardenedRuntime: true,
    // macOS goes by the last ending alone: the program is offered for JSON, and takes no JSON from another program.
    fileAssociations: [{ ext: 'json', name: 'Ringwright plan', role: 'Editor', rank: 'Alternate' }],
  },
  dmg: { writeUpdateInfo: false },
  win: {
    target: [{ target: 'nsis', arch: [...BOTH] }],
    icon: 'build/icons/icon.ico',
  },
  nsis: {
    oneClick: false,
    perMachine: false,
    allowToChangeInstallationDirectory: true,
    deleteAppDataOnUninstall: false,
    differentialPackage: false,
    buildUniversalInstaller: false,
    include: 'build/packaging/open-with.nsh',
  },
}

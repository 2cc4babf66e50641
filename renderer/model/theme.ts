/**
 * Appearance: system, light or dark. The choice is the person's, not the plan's, so it is kept by the program.
 */
import { computed, onScopeDispose, ref, watchEffect, type ComputedRef, type Ref } from 'vue'
import type { Theme } from '../../app/contract'

const STORAGE_KEY = 'ringwright.theme'
const THEMES: readonly Theme[] = ['system', 'light', 'dark']

export interface ThemeStore {
  /** What was chosen. */
  readonly choice: Readonly<Ref<Theme>>
  /** What is shown. */
  readonly shown: ComputedRef<'light' | 'dark'>
  choose(theme: Theme): void
}

export interface ThemeSurroundings {
  readonly storage: Pick<Storage, 'getItem' | 'setItem'> | null
  readonly root: Pick<HTMLElement, 'dataset'>
  /** Whether the system asks for dark; null where that cannot be known. */
  readonly dark: Pick<MediaQueryList, 'matches' | 'addEventListener' | 'removeEventListener'> | null
}

/** A theme store that keeps `data-theme` of the root in step; released with its scope. */
export function createTheme(surroundings: ThemeSurroundings, onChoice: (theme: Theme) => void = () => {}): ThemeStore {
  const { storage, root, dark } = surroundings
  const choice = ref<Theme>(readTheme(storage?.getItem(STORAGE_KEY) ?? null))
  const systemDark = ref(dark?.matches ?? false)
  const shown = computed(() => (choice.value === 'system' ? (systemDark.value ? 'dark' : 'light') : choice.value))
  const follow = (): void => {
    systemDark.value = dark?.matches ?? false
  }
  dark?.addEventListener('change', follow)
  onScopeDispose(() => dark?.removeEventListener('change', follow))
  watchEffect(
    () => {
      root.dataset['theme'] = shown.value
    },
    { flush: 'sync' },
  )
  onChoice(choice.value)
  return {
    choice,
    shown,
    choose(theme) {
      choice.value = theme
      storage?.setItem(STORAGE_KEY, theme)
      onChoice(theme)
    },
  }
}

/** A stored text as a theme; anything unknown follows the system. */
export function readTheme(text: string | null): Theme {
  return THEMES.find((theme) => theme === text) ?? 'system'
}

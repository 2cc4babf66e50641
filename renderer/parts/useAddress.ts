/** The page shown and the page the address names are one thing, so that the browser's way back works. */
import { onScopeDispose, watch, type Ref } from 'vue'
import { pageOfHash, type PageId } from '../model/pages'

export function useAddress(page: Ref<PageId>): void {
  const read = (): void => {
    page.value = pageOfHash(window.location.hash)
  }
  read()
  window.addEventListener('hashchange', read)
  onScopeDispose(() => window.removeEventListener('hashchange', read))
  watch(page, (id) => {
    if (pageOfHash(window.location.hash) !== id) window.location.hash = id
  })
}

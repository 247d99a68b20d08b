import type { Ref } from 'vue'
import { useConfirmStore } from '~/stores/confirm'

/**
 * Asks before a page with unsaved changes is left, by a link, for another part of it, or by closing the tab.
 *
 * @param discard forgets the draft, called when the person chose to leave
 */
export function useUnsavedChanges(unsaved: Ref<boolean>, discard?: () => void): void {
  const confirm = useConfirmStore()
  const { person } = useSession()

  async function ask(): Promise<boolean> {
    // An ended session takes the person to the sign-in page and back; the draft is kept meanwhile.
    if (!unsaved.value || person.value === null) return true
    const leaves = await confirm.ask({
      title: 'Leave without saving?',
      text: 'What you changed here is not saved yet.',
      yes: 'Leave',
      no: 'Stay here',
    })
    if (leaves) discard?.()
    return leaves
  }

  onBeforeRouteLeave(ask)
  onBeforeRouteUpdate(ask)

  const warn = (event: BeforeUnloadEvent) => {
    if (unsaved.value) event.preventDefault()
  }
  onMounted(() => addEventListener('beforeunload', warn))
  onBeforeUnmount(() => removeEventListener('beforeunload', warn))
}

import { defineStore } from 'pinia'
import type { Kind } from '~~/fitting/types'

/** What is being prepared on the upload page, kept while one looks elsewhere: a file chosen or text pasted is not lost by leaving. */
export const useBatchDraftStore = defineStore('batchDraft', () => {
  const kind = ref<Kind>('relative')
  const targetId = ref('')
  const way = ref<'file' | 'text'>('file')
  const text = ref('')
  // A File cannot be carried in the page's payload; it only ever exists in the browser.
  const file = shallowRef<File | null>(null)

  function clear() {
    text.value = ''
    file.value = null
  }

  return { kind, targetId, way, text, file, clear }
})

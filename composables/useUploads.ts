import type { DocumentKind } from '#shared/domain/workflow/origins'

export interface Upload {
  readonly key: number
  readonly file: File
  kind: DocumentKind
  readonly replaces?: string
  /** 0 to 1, of what has left this device */
  sent: number
  state: 'waiting' | 'sending' | 'working' | 'failed' | 'done'
  message: string
}

/** How many go at once: a phone's upstream is narrow, and the server reads each whole. */
const AT_ONCE = 2

/**
 * Sends papers of an entry, each with its progress, its refusal and its retry. By XMLHttpRequest: `fetch` tells nothing of
 * what has left.
 */
export function useUploads(entryId: string, maxBytes: Ref<number>, done: () => Promise<void>) {
  const { t } = useI18n()
  const uploads = ref<Upload[]>([])
  const running = new Map<number, XMLHttpRequest>()
  let made = 0

  function add(file: File, kind: DocumentKind, replaces?: string) {
    const tooLarge = file.size > maxBytes.value
    uploads.value.push({
      key: ++made, file, kind, replaces, sent: 0, state: tooLarge ? 'failed' : 'waiting',
      message: tooLarge ? t('entry.papers.tooLarge', { mb: Math.round(maxBytes.value / 1_048_576) }) : '',
    })
    next()
  }
  function next() {
    while (running.size < AT_ONCE) {
      const upload = uploads.value.find(one => one.state === 'waiting')
      if (!upload) return
      send(upload)
    }
  }
  function send(upload: Upload) {
    upload.state = 'sending'
    upload.sent = 0
    upload.message = ''
    const request = new XMLHttpRequest()
    running.set(upload.key, request)
    request.upload.addEventListener('progress', (event) => {
      upload.sent = event.lengthComputable ? event.loaded / event.total : 0
      if (upload.sent === 1) upload.state = 'working'
    })
    request.addEventListener('load', () => void settle(upload, request))
    request.addEventListener('error', () => fail(upload, t('common.offline')))
    request.addEventListener('abort', () => {
      running.delete(upload.key)
      next()
    })
    request.open('POST', `/api/entries/${entryId}/documents`)
    const form = new FormData()
    form.append('kind', upload.kind)
    if (upload.replaces) form.append('replaces', upload.replaces)
    form.append('file', upload.file, upload.file.name)
    request.send(form)
  }
  async function settle(upload: Upload, request: XMLHttpRequest) {
    if (request.status < 200 || request.status > 299) return fail(upload, refusalOf(request))
    upload.state = 'done'
    running.delete(upload.key)
    next()
    await done()
    uploads.value = uploads.value.filter(one => one.key !== upload.key)
  }
  function refusalOf(request: XMLHttpRequest): string {
    try {
      const problem = JSON.parse(request.responseText) as Partial<ApiProblem>
      return problem.errors?.[0]?.message ?? problem.detail ?? t('entry.papers.failed')
    }
    catch {
      return t('entry.papers.failed')
    }
  }
  function fail(upload: Upload, message: string) {
    running.delete(upload.key)
    upload.state = 'failed'
    upload.message = message
    next()
  }
  function retry(upload: Upload) {
    upload.state = upload.file.size > maxBytes.value ? 'failed' : 'waiting'
    next()
  }
  function dismiss(upload: Upload) {
    uploads.value = uploads.value.filter(one => one.key !== upload.key)
    running.get(upload.key)?.abort()
  }
  onBeforeUnmount(() => running.forEach(request => request.abort()))
  return { uploads, add, retry, dismiss }
}

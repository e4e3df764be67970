import type { FilePaper } from '#shared/schemas/file'
import type { Paper } from '~/components/office/OfficePapers.vue'

/** Papers of a file with the addresses of their pictures: a photograph is its own, a PDF is shown page by page. */
export function usePapers(entryId: string, papers: MaybeRefOrGetter<readonly FilePaper[]>) {
  return computed<Paper[]>(() => toValue(papers).map((paper) => {
    const base = `/api/entries/${entryId}/documents/${paper.id}`
    const isPicture = paper.mime.startsWith('image/')
    return {
      id: paper.id, kind: paper.kind, name: paper.name,
      pages: isPicture ? [base] : Array.from({ length: Math.max(1, paper.pages) }, (_, page) => `${base}/pages/${page + 1}`),
      thumb: `${base}/thumbnail`,
      original: `${base}?download`,
    }
  }))
}

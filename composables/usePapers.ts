import type { FilePaper } from '#shared/schemas/file'
import type { Paper } from '~/components/office/OfficePapers.vue'

/** Papers of a file with the addresses of their pictures: a photograph is its own, a PDF is shown page by page. */
export function usePapers(papers: MaybeRefOrGetter<readonly FilePaper[]>) {
  return computed<Paper[]>(() => toValue(papers).map((paper) => {
    const base = `/api/documents/${paper.id}`
    return {
      id: paper.id, kind: paper.kind, name: paper.name,
      pages: Array.from({ length: paper.pages }, (_, page) => `${base}/picture?page=${page + 1}`),
      thumb: paper.pages > 0 ? `${base}/thumbnail` : null,
      original: `${base}/original`,
      scanned: paper.scanned,
    }
  }))
}

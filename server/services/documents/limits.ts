const MB = 1024 * 1024

/** Bounds of an upload. Bytes unless said. */
export const LIMITS = {
  fileBytes: 25 * MB,
  /** files of one entry, removed ones left out */
  entryFiles: 40,
  entryBytes: 300 * MB,
  /** files that one account sends within 24 hours */
  personFilesADay: 200,
  /** pixels of a picture before it is unpacked: a phone's largest have 200 million */
  pixels: 210_000_000,
  /** longest side of a kept picture, in pixels */
  side: 4096,
  thumbnailSide: 360,
  pdfPages: 20,
  /** longest side of the picture of a page, in pixels */
  pageSide: 1600,
  pdfMs: 30_000,
} as const

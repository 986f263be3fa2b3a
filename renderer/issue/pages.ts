/** Pages of a PDF drawn on canvases, by the package's own worker; nothing is fetched from anywhere else. */
import { getDocument, GlobalWorkerOptions, type PDFDocumentProxy } from 'pdfjs-dist'
import worker from 'pdfjs-dist/build/pdf.worker.min.mjs?url'

GlobalWorkerOptions.workerSrc = worker

export function bytesOf(base64: string): Uint8Array {
  return Uint8Array.from(atob(base64), (sign) => sign.charCodeAt(0))
}

export async function openPdf(base64: string): Promise<PDFDocumentProxy> {
  return getDocument({ data: bytesOf(base64), isEvalSupported: false, disableAutoFetch: true }).promise
}

/** Draws one page at that width in px; gives its text for those who cannot see it. */
export async function drawPage(
  pdf: PDFDocumentProxy,
  number: number,
  canvas: HTMLCanvasElement,
  width: number,
): Promise<string> {
  const page = await pdf.getPage(number)
  const scale = (width * devicePixelRatio) / page.getViewport({ scale: 1 }).width
  const viewport = page.getViewport({ scale })
  canvas.width = viewport.width
  canvas.height = viewport.height
  await page.render({ canvas, viewport }).promise
  const { items } = await page.getTextContent()
  return items.map((item) => ('str' in item ? item.str : '')).join(' ')
}

/** The text of each page of a PDF, read back by a general-purpose PDF reader (pdfjs-dist). */
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'

export async function pdfPages(pdf: Uint8Array): Promise<string[]> {
  const document = await getDocument({ data: pdf.slice(), verbosity: 0 }).promise
  const pages: string[] = []
  for (let number = 1; number <= document.numPages; number++) {
    const content = await (await document.getPage(number)).getTextContent()
    pages.push(content.items.map((item) => ('str' in item ? item.str : '')).join(' '))
  }
  await document.loadingTask.destroy()
  return pages
}

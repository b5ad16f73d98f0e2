import type { PdfFonts } from '#server/adapters/pdf/invoice'

let fonts: Promise<PdfFonts> | undefined

/** The fonts of printed papers, from the files that ship with the build. */
export function readPdfFonts(): Promise<PdfFonts> {
  fonts ??= Promise.all([read('IBMPlexSans_400Regular.ttf'), read('IBMPlexSans_500Medium.ttf'), read('IBMPlexSans_600SemiBold.ttf')])
    .then(([regular, medium, semiBold]) => ({ regular, medium, semiBold }))
  return fonts
}

async function read(name: string): Promise<Buffer> {
  const content = await useStorage('assets:fonts').getItemRaw<Uint8Array>(name)
  if (!content) throw new Error(`the font ${name} is missing from the build`)
  return Buffer.from(content)
}

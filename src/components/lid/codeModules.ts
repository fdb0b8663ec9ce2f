import { create } from 'qrcode'

/** The modules of a code that opens an address; null where there is none. */
export function codeModules(address: string): boolean[][] | null {
  if (address === '') return null
  const { size, data } = create(address, { errorCorrectionLevel: 'M' }).modules
  return Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (_unused, column) => data[row * size + column] === 1),
  )
}

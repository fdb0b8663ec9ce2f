import qrcode from 'qrcode'

/** The dark and light modules of a code that opens an address; null where there is none, or it is too long for one. */
export function codeModules(address: string): boolean[][] | null {
  if (address === '') return null
  const { size, data } = qrcode.create(address, { errorCorrectionLevel: 'M' }).modules
  return Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (_unused, column) => data[row * size + column] === 1),
  )
}

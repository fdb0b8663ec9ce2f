/** A text cut into plain pieces and web addresses, in order. */
export function splitLinks(text: string): { text: string; link: boolean }[] {
  return text
    .split(/(https?:\/\/[^\s<>"]+)/)
    .map((piece, i) => ({ text: piece, link: i % 2 === 1 }))
    .filter((piece) => piece.text !== '')
}

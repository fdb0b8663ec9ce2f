/** A piece of the sheet's lower band: it knows its size and draws itself where it is put. */
export interface Block {
  width: number
  height: number
  draw(x: number, y: number): string
}

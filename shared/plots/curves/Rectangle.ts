/** px, y downwards */
export interface Rectangle {
  x: number
  y: number
  width: number
  height: number
}

export interface ImageSize {
  width: number
  height: number
}

/** Width and height (px) from the header of a PNG (ISO/IEC 15948, IHDR is the first chunk); null where it is cut short. */
export function sizeOfPng(bytes: Buffer): ImageSize | null {
  if (bytes.length < 24 || bytes.toString('latin1', 12, 16) !== 'IHDR') return null
  return { width: bytes.readUInt32BE(16), height: bytes.readUInt32BE(20) }
}

/** Markers that start a frame (ITU-T T.81, table B.1): all of C0 to CF but the tables C4, C8 and CC. */
const startsFrame = (marker: number) => marker >= 0xC0 && marker <= 0xCF && ![0xC4, 0xC8, 0xCC].includes(marker)

/** Width and height (px) from the first frame header of a JPEG; null where there is none. */
export function sizeOfJpeg(bytes: Buffer): ImageSize | null {
  let at = 2
  while (at + 9 <= bytes.length && bytes[at] === 0xFF) {
    const marker = bytes[at + 1] ?? 0
    if (startsFrame(marker)) return { height: bytes.readUInt16BE(at + 5), width: bytes.readUInt16BE(at + 7) }
    at += 2 + bytes.readUInt16BE(at + 2)
  }
  return null
}

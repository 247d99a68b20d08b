const plain = (text: string) => text.replace(/[^A-Za-z0-9]+/g, '-')

/** Anchors of the document's parts; the place in the list keeps two codes that read alike apart. */
export const loopAnchor = (index: number, code: string): string => `loop-${index + 1}-${plain(code)}`
export const conditionAnchor = (loop: string, index: number): string => `${loop}-condition-${index + 1}`

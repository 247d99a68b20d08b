/** What is told of blocks that name one another in a circle, or of one that names itself; each block once, in the order in which it needs the next. */
export const circleInWords = (circle: readonly string[]): string => circle.length === 1
  ? `The block ${circle[0]} names itself.`
  : `These blocks name one another in a circle: ${[...circle, circle[0]].join(', ')}. Write one of them without the others; a feedback is written as G/(1 + G*H).`

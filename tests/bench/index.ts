import { apiRows } from './api.ts'
import { canvasRows } from './canvas.ts'
import { commentRows } from './comments.ts'
import { fullCheckRows } from './fullCheck.ts'
import { printTable } from './measure.ts'
import { networkSolveRows } from './networkSolve.ts'
import { paperRows } from './papers.ts'
import { revisionRows } from './revisions.ts'
import { scriptSizeRows } from './scriptSizes.ts'

/** `npm run bench`: one table, medians, with something from outside beside each figure where there is such a thing. */
printTable([
  ...networkSolveRows(),
  ...fullCheckRows(),
  ...(await apiRows()),
  ...(await revisionRows()),
  ...(await commentRows()),
  ...(await paperRows()),
  ...(await scriptSizeRows()),
  ...(await canvasRows()),
])

import type { BuildDocument } from '../build/document.ts'
import type { CatalogIndex } from '../catalog/catalog.ts'
import { analyse } from '../check/check.ts'
import type { CheckResult } from '../check/result.ts'
import type { Answer } from './answer.ts'
import { answerCables } from './answers/cables.ts'
import { answerControllers } from './answers/controllers.ts'
import { answerDrives } from './answers/drives.ts'
import { answerFigures } from './answers/figures.ts'
import { answerFindings } from './answers/findings.ts'
import { answerPower } from './answers/power.ts'
import { answerSupply } from './answers/supply.ts'

/** What a reviewer asks first, answered from the plan and from what the checker says of it. */
export function answerQuestions(document: BuildDocument, catalog: CatalogIndex, result: CheckResult): Answer[] {
  const input = { analysis: analyse(document, catalog), result }
  return [
    answerSupply(input),
    answerPower(input),
    answerDrives(input),
    answerControllers(input),
    answerCables(input),
    answerFigures(input),
    answerFindings(input),
  ]
}

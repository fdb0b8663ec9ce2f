import '../zodWithoutEval.ts'
import { createDesk } from './checkerDesk.ts'
import type { CheckerRequest } from './messages.ts'

const scope = self as unknown as DedicatedWorkerGlobalScope
const desk = createDesk(
  (message) => scope.postMessage(message),
  (run) => setTimeout(run, 0),
  () => performance.now(),
)
scope.onmessage = (event: MessageEvent<CheckerRequest>) => desk.receive(event.data)

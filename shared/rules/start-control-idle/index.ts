import type { ResolvedPart } from '../../build/resolve.ts'
import type { SpinUpMeans } from '../../catalog/model.ts'
import { partSubject } from '../../check/subjects.ts'
import { counted, nameOf, refsOf } from '../../check/words.ts'
import type { IdleStart } from '../../electrical/startPlan.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  culprit: ResolvedPart
  reason: IdleStart['reason']
  drives: ResolvedPart[]
  by: SpinUpMeans
}

const meansName: Readonly<Record<SpinUpMeans, string>> = {
  controller: 'the controller',
  'device-pin': 'contact 11',
  'standby-command': 'a command from the system',
}

export const startControlIdle = defineRule<Facts>({
  meta: {
    id: 'start-control-idle',
    title: 'A staged start that will not happen',
    severities: ['fault'],
    finds:
      'Drives that start with the power although a staged start is planned, because the drive, controller, expander or power outlet does not pass the delay on.',
    why: 'The plan counts on groups; these drives all start in the first second. The sums shown already count them there.',
    needs: [
      'planned start',
      'start control that drives, controllers and expanders understand',
      'contact 11 of each outlet',
    ],
    sources: ['S38', 'S39', 'S45'],
  },
  check({ power }) {
    const { idle, by } = power.startPlan
    const groups = new Map<string, Facts>()
    for (const { drive, culprit, reason } of idle) {
      // Drives of one model that lack the means are one finding; other culprits stand for themselves.
      const key = reason === 'drive' ? `drive/${culprit.model.id}` : `${reason}/${culprit.part.ref}`
      const known = groups.get(key)
      if (known) known.drives.push(drive)
      else groups.set(key, { culprit, reason, drives: [drive], by })
    }
    return [...groups.values()].map((facts) => ({
      severity: 'fault' as const,
      subjects: [...new Set([facts.culprit, ...facts.drives])].map(partSubject),
      detail: facts.reason === 'drive' ? facts.culprit.model.id : facts.reason,
      facts,
    }))
  },
  words({ facts: { culprit, reason, drives, by } }) {
    const start = `${refsOf(drives)} ${drives.length === 1 ? 'starts' : 'start'} with the power`
    const otherwise = 'or plan the start by another means, or for all drives at once.'
    switch (reason) {
      case 'drive':
        return {
          message: `${start}: ${counted(drives.length, 'drive')} of the model "${culprit.model.name}" ${drives.length === 1 ? 'does' : 'do'} not wait for ${meansName[by]}.`,
          remedy: `Use drives that understand it, ${otherwise}`,
        }
      case 'controller':
      case 'expander':
        return {
          message: `${start}: ${nameOf(culprit)} does not stage the start by ${meansName[by]}.`,
          remedy: `Use ${reason === 'expander' ? 'an expander' : 'a controller'} that passes it on, ${otherwise}`,
        }
      case 'contact-grounded':
        return {
          message: `${start}: ${nameOf(culprit)} grounds contact 11, which tells a drive not to wait.`,
          remedy: `Feed them from outlets whose contact 11 floats, ${otherwise}`,
        }
      case 'contact-unknown':
        return {
          message: `${start}, as far as is known: whether contact 11 floats at ${nameOf(culprit)} is not stated.`,
          remedy: `Measure contact 11 against the return and state it, ${otherwise}`,
        }
    }
  },
})

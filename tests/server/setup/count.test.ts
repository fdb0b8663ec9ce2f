import { describe, expect, it } from 'vitest'
import { countTests } from '../../../server/setup/vitestRun.mjs'

const file = (status: string, ...tests: string[]) => ({
  name: 'x.test.ts',
  status,
  assertionResults: tests.map((test) => ({ status: test })),
})
const report = (passed: number, failed: number, ...testResults: ReturnType<typeof file>[]) => ({
  numPassedTests: passed,
  numFailedTests: failed,
  numPendingTests: 0,
  numTodoTests: 0,
  testResults,
})

describe('the count of tests', () => {
  it('takes what the report says', () =>
    expect(countTests(report(2, 1, file('failed', 'passed', 'passed', 'failed')), 1)).toEqual({
      passed: 2,
      failed: 1,
      skipped: 0,
    }))

  it('counts a file that could not be loaded', () =>
    expect(countTests(report(1, 0, file('passed', 'passed'), file('failed')), 1)).toMatchObject({
      passed: 1,
      failed: 1,
    }))

  it('counts a file whose hook failed after its tests passed', () =>
    expect(countTests(report(1, 0, file('failed', 'passed')), 1)).toMatchObject({ passed: 1, failed: 1 }))

  it('counts a run that failed outside every test', () =>
    expect(countTests(report(3, 0, file('passed', 'passed')), 1)).toMatchObject({ passed: 3, failed: 1 }))

  it('counts a run without a report as failed', () =>
    expect(countTests(null, 1)).toEqual({ passed: 0, failed: 1, skipped: 0 }))
})

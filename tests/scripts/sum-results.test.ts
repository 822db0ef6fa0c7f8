import { describe, expect, it } from 'vitest'
import { sumResults } from '../../scripts/steps/sum-results.mjs'

const passed = { status: 'passed', assertionResults: [{ status: 'passed' }] }

describe('the sum of a test run', () => {
  it('is what the report counts', () => {
    const failed = { status: 'failed', assertionResults: [{ status: 'failed' }, { status: 'passed' }] }
    const report = { numPassedTests: 2, numFailedTests: 1, testResults: [passed, failed] }
    expect(sumResults(report, 1)).toEqual({ passed: 2, failed: 1 })
    expect(sumResults({ numPassedTests: 1, numFailedTests: 0, testResults: [passed] }, 0)).toEqual({
      passed: 1,
      failed: 0,
    })
  })

  it('counts a file that could not be read as failed', () => {
    const report = {
      numPassedTests: 1,
      numFailedTests: 0,
      testResults: [passed, { status: 'failed', assertionResults: [] }],
    }
    expect(sumResults(report, 1)).toEqual({ passed: 1, failed: 1 })
  })

  it('is never 0 failed after a crash, without a report, or without a single test', () => {
    expect(sumResults({ numPassedTests: 1, numFailedTests: 0, testResults: [passed] }, 1).failed).toBe(1)
    expect(sumResults(null, 0).failed).toBe(1)
    expect(sumResults({ numPassedTests: 0, numFailedTests: 0, testResults: [] }, 0).failed).toBe(1)
  })
})

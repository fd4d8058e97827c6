import { describe, expect, it } from 'vitest'
import { assessSheet } from '#shared/assessment/assess-sheet'
import { FINDING_RULES } from '#shared/assessment/findings/all'
import { FINDING_CODES, type FindingCode } from '#shared/assessment/findings/codes'
import { AIR_CASES } from './air-cases'
import { CLOSE_CASES } from './close-cases'
import { EVENING, type FindingCase } from './finding-case'
import { FLOW_CASES } from './flow-cases'
import { SET_UP_CASES } from './set-up-cases'

// A code without its case does not compile, and the count below says so too.
const CASES: Record<FindingCode, FindingCase> = { ...SET_UP_CASES, ...FLOW_CASES, ...AIR_CASES, ...CLOSE_CASES }

describe('the list of findings', () => {
  it('has one rule and one case for each code', () => {
    expect(FINDING_RULES.map(rule => rule.code)).toEqual([...FINDING_CODES])
    expect(FINDING_CODES.filter(code => !CASES[code])).toEqual([])
    expect(Object.keys(CASES)).toHaveLength(FINDING_CODES.length)
  })
})

describe.each(FINDING_CODES.map(code => [code, CASES[code]] as const))('%s', (code, example) => {
  it(`finds ${example.finds}`, () => {
    const found = assessSheet(example.in(), example.at ?? EVENING).findings.filter(finding => finding.code === code)
    expect(found).not.toEqual([])
    expect(found[0]?.severity).toBe(example.severity)
  })

  it(`lets ${example.passes} pass`, () => {
    expect(assessSheet(example.not(), example.notAt ?? EVENING).findings.filter(finding => finding.code === code)).toEqual([])
  })

  it('says what, which rule, whose, and what to do, in short plain sentences', () => {
    for (const finding of assessSheet(example.in(), example.at ?? EVENING).findings) {
      expect(finding.title).toMatch(/^\S.*[^ ]$/)
      expect(finding.title).not.toMatch(/undefined|NaN|null|\[object|!| {2}/)
      expect(finding.title.length).toBeLessThan(170)
      for (const words of [finding.whatNow, finding.rule, finding.source]) expect(words.trim().length).toBeGreaterThan(2)
      for (const { value } of finding.numbers) expect(Number.isNaN(value)).toBe(false)
    }
  })

  it('gives each of its findings a subject of its own', () => {
    const subjects = assessSheet(example.in(), example.at ?? EVENING).findings.filter(finding => finding.code === code).map(finding => finding.subject)
    expect(new Set(subjects).size).toBe(subjects.length)
  })
})

import {
  AGENT_ID, aBundle, aDay, aLimit, aMethod, anId, aSampler, aSibling, aSurvey, aTimer, blanks, clock,
} from '../../../../fixtures/builders'
import type { FindingCase } from './finding-case'

const day = aDay()
const started = [aTimer('start', '07:00')]
const numbered = (number: string, kind: 'personal' | 'field-blank' = 'personal', state: 'open' | 'void' = 'open') => [...blanks(), aSibling({ number, kind, state })]

export const SET_UP_CASES = {
  'number-used-twice': {
    finds: 'a number on two samples, whatever the capitals', severity: 'stop',
    in: () => aBundle({ sheet: { number: 'A-001' }, siblings: numbered('a-001 ') }),
    passes: 'the number of a void sheet', not: () => aBundle({ sheet: { number: 'A-001' }, siblings: numbered('A-001', 'personal', 'void') }),
  },
  'blank-number-as-sample': {
    finds: 'a blank\'s number on a sample', severity: 'stop',
    in: () => aBundle({ sheet: { number: 'B-001' } }),
    passes: 'a number of its own', not: () => aBundle({ sheet: { number: 'A-001' } }),
  },
  'air-differs-from-method': {
    finds: 'a pumped sheet with a diffusive method', severity: 'attention',
    in: () => aBundle({ method: aMethod({ air: 'diffusive' }) }),
    passes: 'a blank, which draws no air at all', not: () => aBundle({ sheet: { kind: 'field-blank' }, method: aMethod({ air: 'diffusive' }) }),
  },
  'record-missing': {
    finds: 'a pump that is not here', severity: 'note', in: () => aBundle({ pumps: [] }),
    passes: 'a sheet with all its records', not: () => aBundle(),
  },
  'method-from-memory': {
    finds: 'a method row from memory', severity: 'note', in: () => aBundle({ method: aMethod({ status: 'memory' }) }),
    passes: 'a row read in its source', not: () => aBundle({ method: aMethod({ status: 'verified' }) }),
  },
  'sampler-from-memory': {
    finds: 'a design flow from memory', severity: 'note', in: () => aBundle({ sampler: aSampler({ status: 'memory' }) }),
    passes: 'a sampler without a design flow', not: () => aBundle({ sampler: aSampler({ status: 'memory', designFlowLitresPerMinute: null }) }),
  },
  'method-range-missing': {
    finds: 'an empty maximum volume', severity: 'note', in: () => aBundle({ method: aMethod({ volumeMaximumLitres: null }) }),
    passes: 'a method with every bound', not: () => aBundle(),
  },
  'medium-expired': {
    finds: 'a medium one day out of date', severity: 'attention', in: () => aBundle({ sheet: { mediumExpiresOn: '2026-03-02' }, events: started }),
    passes: 'a medium on its last day', not: () => aBundle({ sheet: { mediumExpiresOn: '2026-03-03' }, events: started }),
  },
  'medium-expiry-missing': {
    finds: 'no last day of the medium', severity: 'note', in: () => aBundle({ sheet: { mediumExpiresOn: null }, events: started }),
    passes: 'a sheet that is not started', not: () => aBundle({ sheet: { mediumExpiresOn: null } }),
  },
  'medium-lot-missing': {
    finds: 'no lot of the medium', severity: 'note', in: () => aBundle({ sheet: { mediumLot: ' ' }, events: started }),
    passes: 'a lot', not: () => aBundle({ events: started }),
  },
  'train-checks-open': {
    finds: 'a leak check that nobody answered', severity: 'note', in: () => aBundle({ sheet: { checkLeak: null }, events: started }),
    passes: 'a train that was looked at', not: () => aBundle({ events: started }),
  },
  'uptake-missing': {
    finds: 'a diffusive sampler without its rate', severity: 'attention',
    in: () => aBundle({ sheet: { air: 'diffusive', uptakeMillilitresPerMinute: null }, events: started }),
    passes: 'one with its rate', not: () => aBundle({ sheet: { air: 'diffusive', uptakeMillilitresPerMinute: 30 }, events: started }),
  },
  'shift-missing': {
    finds: 'a shift that ends before it starts', severity: 'note',
    in: () => aBundle({ sheet: { shiftStartsAt: clock('22:00'), shiftEndsAt: clock('06:00') }, events: day }),
    passes: 'a night shift that ends on the next day',
    not: () => aBundle({ sheet: { shiftStartsAt: clock('22:00'), shiftEndsAt: '2026-03-04T06:00:00.000Z' }, events: day }),
  },
  'limit-fraction': {
    finds: 'a total-dust sampler where the limits are for respirable dust', severity: 'note', in: () => aBundle({ limits: [aLimit({ fraction: 'Respirable' })] }),
    passes: 'a limit for any fraction beside it',
    not: () => aBundle({ limits: [aLimit({ fraction: 'respirable' }), aLimit({ id: anId('limit', 2), agentId: AGENT_ID, fraction: '' })], survey: aSurvey() }),
  },
} as const satisfies Record<string, FindingCase>

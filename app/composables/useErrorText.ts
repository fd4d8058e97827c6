import { InvalidChange, NotSaved } from '~/local/commit'

/** A failure in words: what happened, and what is safe and what to do next. */
export interface ErrorText { title: string, message: string }

const REFUSED: Readonly<Record<string, string>> = {
  'stale-state': 'The sheet had moved on when this arrived: somebody else took a step first. Everything you wrote is kept. Look at the sheet and take the step again if it is still needed.',
  'not-from-here': 'The sheet was handed in already when this arrived. Everything you wrote is kept. Nothing more is needed unless the office returns it.',
  'needs-reason': 'This step needs a reason. Everything you wrote is kept. Hand in again and say why.',
  'stop-findings': 'A stop finding stands, so this cannot be taken as fit. Everything you wrote is kept. Hand in as not fit, with the reason.',
  'not-allowed': 'Your account may not take this step. Everything you wrote is kept. Ask the office.',
}

const HELD: Readonly<Record<string, string>> = {
  'locked': 'The office had taken the sheet over when this arrived. It is kept beside the sheet. Tell the office, and they can look at it there.',
  'no-access': 'You are not in the crew of this survey. The change reached the office and is kept there. Ask the office to add you.',
  'not-allowed': 'Your account may not change this. The change reached the office and is kept there. Ask the office.',
  'unknown-object': 'The record it belongs to is not known at the office. The change is kept there. Tell the office.',
  'unknown-event': 'The entry that this takes back is not known at the office. The change is kept there. Tell the office.',
  'invalid': 'The office could not put this value into the field. What you entered is kept there word for word. Enter it again if you can.',
  'id-reused': 'This change came with the identity of another one. Both are kept at the office. Tell the office.',
  'revoked': 'This account was signed out for good. The change reached the office and is kept there. Tell the office.',
  'newer-schema': 'The office system is older than this app. The change is kept there and is taken in after its update. Nothing to do.',
}

const KEPT: Readonly<Record<string, string>> = {
  'too-large': 'This change is too large to send. It is safe on this phone. Save a copy under Sending and give it to the office.',
  'not-understood': 'The office system could not read this change. It is safe on this phone. Save a copy under Sending and give it to the office.',
}

const REQUEST: Readonly<Record<string, ErrorText>> = {
  'wrong-sign-in': { title: 'That did not match', message: 'The e-mail address or the password is not right. Nothing on this phone has changed. Try again.' },
  'too-many-attempts': { title: 'Too many attempts', message: 'Signing in is paused for a few minutes. Nothing on this phone has changed. Wait and try again.' },
  'no-answer': { title: 'No connection', message: 'The server cannot be reached. What is saved on this phone is safe. Try again when there is a connection.' },
  'server-error': { title: 'The server could not do this', message: 'Something failed at the server. What is saved on this phone is safe. Try again in a minute.' },
}

/** The one place where a code becomes words for a person: what happened, what is safe, what to do next. */
export function useErrorText() {
  /** Why a change was not taken. `reason` may carry a detail after a colon. */
  function refusal(outcome: string, reason: string | null): string {
    const [code = ''] = (reason ?? '').split(':')
    if (outcome === 'refused') return REFUSED[code] ?? 'The step was not taken. Everything you wrote is kept. Look at the sheet and take the step again if it is still needed.'
    if (outcome === 'kept') return KEPT[code] ?? 'The office gave an answer that this version does not know. The change is safe on this phone. Update the app, or save a copy under Sending.'
    return HELD[code] ?? 'The change reached the office and is kept there, but it is not in the record yet. Tell the office.'
  }

  /** What to say when writing something down on the phone failed. */
  function notSaved(error: unknown): ErrorText {
    if (error instanceof InvalidChange) return { title: 'Not saved', message: `${error.message} What you typed is still here.` }
    if (error instanceof NotSaved) return { title: 'Not saved', message: 'The phone did not keep this. What you typed is still here. Free some space on the phone and try again, or write it on paper now.' }
    return { title: 'Not saved', message: 'Something went wrong before this was kept. What you typed is still here. Try again, or write it on paper now.' }
  }

  /** What to say when a request to the server failed. */
  function request(error: unknown): ErrorText {
    return REQUEST[requestCode(error)] ?? REQUEST['server-error']!
  }

  return { refusal, notSaved, request }
}

/** The code that the server put beside the failure, or one for having had no answer at all. */
export function requestCode(error: unknown): string {
  const { data, status, statusCode } = (error ?? {}) as { data?: { code?: unknown, data?: { code?: unknown } | null } | null, status?: number, statusCode?: number }
  const code = data?.data?.code ?? data?.code
  if (typeof code === 'string') return code
  const answered = status ?? statusCode
  if (answered === undefined) return 'no-answer'
  if (answered === 401) return 'wrong-sign-in'
  return answered === 429 ? 'too-many-attempts' : 'server-error'
}

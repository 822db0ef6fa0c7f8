/** Every expected failure: code → HTTP status → the sentence said when nothing more exact is known. */
export const errors = {
  'bad-request': {
    status: 400,
    sentence: 'The request could not be read. Send JSON as the field list says.',
  },
  invalid: { status: 422, sentence: 'Something in the request is not as expected.' },
  'not-signed-in': { status: 401, sentence: 'Sign in first.' },
  'wrong-sign-in': { status: 401, sentence: 'Address or password is not right.' },
  'choose-organisation': { status: 403, sentence: 'Choose the shop or school to work in first.' },
  'not-allowed': { status: 403, sentence: 'Your role does not allow this.' },
  'wrong-origin': { status: 403, sentence: 'This request came from another site and was not carried out.' },
  'not-found': { status: 404, sentence: 'Not found.' },
  'stale-revision': {
    status: 409,
    sentence: 'Someone saved a newer edition of this circuit. Yours was not saved.',
  },
  'connector-differs': {
    status: 409,
    sentence: 'A connector of this document differs from the one this vehicle already has.',
  },
  'connector-in-use': {
    status: 409,
    sentence: 'The connector cannot be replaced: other circuits use cavities that the new one does not have.',
  },
  'id-taken': { status: 409, sentence: 'This id is already used for something else.' },
  'address-taken': { status: 409, sentence: 'This address already has an account. Sign in with it.' },
  'cautions-first': {
    status: 409,
    sentence: 'Answer the cautions of this circuit before the first reading.',
  },
  'finding-first': { status: 409, sentence: 'Say what was found and repaired before proving the repair.' },
  'trace-done': { status: 409, sentence: 'This trace is closed. Start another one to take more readings.' },
  'too-large': { status: 413, sentence: 'The request is larger than 2 MB and was refused.' },
  'not-json': { status: 415, sentence: 'Send the request as JSON (content type application/json).' },
  'reading-refused': { status: 422, sentence: 'This reading cannot be taken in this condition.' },
  'evaluation-too-long': {
    status: 422,
    sentence:
      'This circuit takes longer than 30 seconds to evaluate here. Send the part of it that the fault can lie in.',
  },
  'too-many-attempts': {
    status: 429,
    sentence: 'Too many attempts to sign in. Wait a quarter of an hour and try again.',
  },
  unexpected: { status: 500, sentence: 'Something went wrong on the server. Nothing was changed.' },
  'evaluator-busy': {
    status: 503,
    sentence: 'Others are waiting for the evaluator already. Try again in a minute.',
  },
  'database-away': {
    status: 503,
    sentence: 'The database cannot be reached. Nothing was changed; what you typed is still here. Try again.',
  },
} as const satisfies Record<string, { status: number; sentence: string }>

export type ErrorCode = keyof typeof errors

export const errorCodes = Object.keys(errors) as [ErrorCode, ...ErrorCode[]]

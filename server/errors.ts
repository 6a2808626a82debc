import type { Problem } from '../shared/schemas/problem';

/**
 * Every refusal of the product: code -> HTTP status, title, and what to do. The sentence (`detail`) is given
 * where the refusal is made, because it names the case; the code is what programs and tests rely on.
 */
const REFUSALS = {
  'bad-request': { status: 400, title: 'The request is not understood', hint: 'Correct the fields named in the list.' },
  'not-signed-in': { status: 401, title: 'Not signed in', hint: 'Sign in and try again.' },
  'sign-in-failed': {
    status: 401,
    title: 'Sign-in failed',
    hint: 'Check the e-mail address and the password; both must be right.',
  },
  'header-missing': {
    status: 403,
    title: 'Request from elsewhere',
    hint: 'Changing requests carry the header "X-Idem: 1".',
  },
  'role-too-low': { status: 403, title: 'Your role may not do this', hint: 'Ask an owner of the group.' },
  'not-found': { status: 404, title: 'Not found', hint: 'Check the address; it may belong to another group.' },
  'already-set-up': { status: 409, title: 'Already set up', hint: 'Sign in with an existing account.' },
  'label-taken': { status: 409, title: 'Label in use', hint: 'Choose another label for the catalogue.' },
  'email-taken': { status: 409, title: 'Already a member', hint: 'Change the role of the existing member instead.' },
  'account-missing': {
    status: 409,
    title: 'No account with this e-mail',
    hint: 'Give a first password; the account is made with it.',
  },
  'last-owner': { status: 409, title: 'A group needs an owner', hint: 'Make somebody else an owner first.' },
  'not-ready': { status: 409, title: 'Not ready yet', hint: 'Wait until the job has finished.' },
  'already-finished': { status: 409, title: 'Already finished', hint: 'There is nothing left to cancel.' },
  'already-taken-back': { status: 409, title: 'Already taken back', hint: 'Load the page again to see the present state.' },
  'too-many-pairs': {
    status: 422,
    title: 'Too many pairs',
    hint: 'Choose a smaller radius, or match a less crowded part of the sky.',
  },
  'stale-version': {
    status: 412,
    title: 'Changed in the meantime',
    hint: 'Load the present state, look at the difference and try again.',
  },
  'version-missing': { status: 428, title: 'Version missing', hint: 'Send the version you have seen in If-Match.' },
  'file-too-large': { status: 413, title: 'File too large', hint: 'Split the file, or compress it with gzip.' },
  'file-unreadable': { status: 422, title: 'The file cannot be read', hint: 'Look at the file in a text editor.' },
  'upload-missing': { status: 400, title: 'No file came', hint: 'Send one file as multipart form data.' },
  'mapping-refused': { status: 422, title: 'The columns do not fit the file', hint: 'Choose the columns again.' },
  'no-sources': { status: 422, title: 'No row could be read as a source', hint: 'Check the columns of the position.' },
  'nothing-to-decide': { status: 422, title: 'Nothing to decide', hint: 'Choose other objects or sources.' },
  'too-many-requests': { status: 429, title: 'Too many requests', hint: 'Wait a minute and try again.' },
  'job-lost': { status: 500, title: 'The job was lost', hint: 'Start it again.' },
  internal: { status: 500, title: 'Something went wrong here', hint: 'Try again; if it stays, tell who runs the server.' },
  'database-away': { status: 503, title: 'The database does not answer', hint: 'Try again in a few seconds.' },
} as const;

export type RefusalCode = keyof typeof REFUSALS;
type FieldErrors = NonNullable<Problem['errors']>;

/** A refusal that a person can act on; carries no secrets and may be shown as it is. */
export class Refusal extends Error {
  readonly code: RefusalCode;
  readonly errors: FieldErrors | undefined;
  readonly hint: string;

  constructor(code: RefusalCode, detail: string, more: { errors?: FieldErrors; hint?: string } = {}) {
    super(detail);
    this.name = 'Refusal';
    this.code = code;
    this.errors = more.errors;
    this.hint = more.hint ?? REFUSALS[code].hint;
  }

  get status(): number {
    return REFUSALS[this.code].status;
  }

  /** The problem-details body of this refusal. */
  toProblem(): Problem {
    const { status, title } = REFUSALS[this.code];
    return {
      type: `/problems/${this.code}`,
      title,
      status,
      code: this.code,
      detail: this.message,
      hint: this.hint,
      ...(this.errors === undefined ? {} : { errors: this.errors }),
    };
  }
}

/** Throws a refusal; `detail` is one sentence that names the case. */
export function refuse(
  code: RefusalCode,
  detail: string,
  more: { errors?: FieldErrors; hint?: string } = {},
): never {
  throw new Refusal(code, detail, more);
}

/** Throws 'not-found' unless the thing is there: the same answer for a foreign and for a missing one. */
export function found<T>(thing: T | null | undefined, what: string): T {
  if (thing === null || thing === undefined) refuse('not-found', `There is no ${what} here.`);
  return thing;
}

/**
 * The catalogue of expected failures. The names are permanent: they appear in
 * problem details (`type: /problems/<name>`), in logs and in tests.
 *
 * `absent` is the one answer for "does not exist" and "not yours".
 */
export type FailureName =
  | 'absent'
  | 'sign-in-required'
  | 'fresh-sign-in-required'
  | 'invalid'
  | 'stale'
  | 'same-id-other-content'
  | 'not-in-this-state'
  | 'conflict-of-interest'
  | 'too-large'
  | 'unsupported-file'
  | 'damaged-file'
  | 'link-spent'
  | 'too-many-requests'
  | 'read-only'
  | 'unavailable';

/** One fault in what was sent: a JSON Pointer (RFC 6901) to the place, and words that say how to mend it. */
export interface Fault {
  readonly pointer: string;
  readonly detail: string;
}

export interface Failure {
  readonly name: FailureName;
  /** What happened and what to do, in one or two plain sentences. */
  readonly detail: string;
  readonly faults?: readonly Fault[];
}

export const failure = (name: FailureName, detail: string, faults?: readonly Fault[]): Failure =>
  faults === undefined ? { name, detail } : { name, detail, faults };

export const absent = (): Failure =>
  failure('absent', 'There is nothing here, or it is not open to you.');

export const invalid = (faults: readonly Fault[]): Failure =>
  failure(
    'invalid',
    faults.length === 1
      ? `One entry needs correcting: ${faults[0]?.detail ?? ''}`
      : `${faults.length} entries need correcting.`,
    faults,
  );

export const stale = (): Failure =>
  failure(
    'stale',
    'Someone changed this after you opened it. Your entries are kept; compare them with the newer ones and choose.',
  );

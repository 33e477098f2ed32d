/**
 * Something a person can mend: `message` says what is wrong, `mend` what to do about it.
 */
export class Problem extends Error {
  /**
   * @param {string} message
   * @param {string} mend
   */
  constructor(message, mend) {
    super(message);
    this.name = 'Problem';
    this.mend = mend;
  }
}

/** @param {unknown} error */
const codeOf = (error) =>
  error instanceof Error && 'code' in error
    ? String(/** @type {{code: unknown}} */ (error).code)
    : '';

/**
 * The same trouble in words: a `Problem` as it is, the common faults of the system named, anything
 * else as the defect it is.
 *
 * @param {unknown} error
 * @returns {{ message: string, mend: string, trace?: string }}
 */
export function explain(error) {
  if (error instanceof Problem) return { message: error.message, mend: error.mend };
  const text = error instanceof Error ? error.message : String(error);
  const code = codeOf(error);
  if (code === 'ENOSPC' || /no space left on device/i.test(text)) {
    return {
      message: `The disk is full. ${text}`,
      mend: 'Free some space, then run the command again.',
    };
  }
  if (code === 'EDQUOT') {
    return {
      message: `The disk quota is used up. ${text}`,
      mend: 'Free some space, then run again.',
    };
  }
  if (code === 'EROFS') {
    return {
      message: `This folder cannot be written. ${text}`,
      mend: 'Use a checkout on a writable disk.',
    };
  }
  if (code === 'EACCES' || code === 'EPERM') {
    return {
      message: `This account may not do that. ${text}`,
      mend: 'Run as the account that owns the checkout and its storage folder.',
    };
  }
  if (code === 'EMFILE' || code === 'ENFILE') {
    return {
      message: `Too many open files. ${text}`,
      mend: 'Raise the limit with `ulimit -n 4096`.',
    };
  }
  const trace = error instanceof Error ? error.stack : undefined;
  return {
    message: text,
    mend: 'This is a defect of the start-up code; the trace below says where.',
    ...(trace === undefined ? {} : { trace }),
  };
}

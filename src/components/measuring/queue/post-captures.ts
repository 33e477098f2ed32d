import type { CapturesAnswer, CapturesRequest } from '@/contracts/inspection/captures';
import type { PostAnswer } from './send-waiting';

interface Problem {
  readonly detail?: string;
  readonly errors?: readonly { readonly pointer: string; readonly detail: string }[];
}

const TIMEOUT_MS = 20_000;

/** One sending to the server. What is no clear yes or no counts as not arrived, and is tried again. */
export const postCaptures = async (
  inspectionId: string,
  body: CapturesRequest,
): Promise<PostAnswer> => {
  try {
    const response = await fetch(`/api/inspections/${inspectionId}/captures`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
      signal: AbortSignal.timeout(TIMEOUT_MS),
    });
    if (response.ok) return { kind: 'kept', answer: (await response.json()) as CapturesAnswer };
    if (response.status === 401) return { kind: 'sign-in' };
    if (response.status >= 500 || response.status === 429) return { kind: 'unreachable' };
    const problem = (await response.json()) as Problem;
    return {
      kind: 'refused',
      detail: problem.detail ?? `The server answered ${response.status}.`,
      places: (problem.errors ?? []).map((error) => error.detail),
    };
  } catch {
    return { kind: 'unreachable' };
  }
};

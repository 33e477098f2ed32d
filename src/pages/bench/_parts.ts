import type { FieldGroup, Typed } from '@/components/bench/fields';
import { faultsByField, typedFrom } from '@/components/bench/typed';
import { engineRequest } from '@/contracts/bench/engine';
import { workOutEngine } from '@/services/bench/work-out-engine';
import { work } from './_work';

/** One form of a page that holds several; `of` names it in the link. */
export interface Part {
  readonly of: string;
  readonly groups: readonly FieldGroup[];
  readonly body: (typed: Typed) => unknown;
  readonly example: string;
  readonly heading: string;
  /** Before the value; nothing where the answer has several figures. */
  readonly name: string;
  readonly places: number;
}

/** Works out the part that the link asks for; the others stay empty. */
export function workOutParts(parts: readonly Part[], query: URLSearchParams) {
  return parts.map(({ body, ...part }) => {
    const asked = query.get('of') === part.of;
    const typed = asked ? typedFrom(query, part.groups) : {};
    const result = asked ? work(engineRequest, body(typed), workOutEngine) : undefined;
    const failure = result?.ok === false ? result.failure : undefined;
    return {
      ...part,
      typed,
      faults: faultsByField(part.groups, failure),
      answer: result?.ok === true ? result.value : undefined,
      failed: failure !== undefined,
    };
  });
}

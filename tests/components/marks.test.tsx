import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Mark } from '@/components/look/Mark';
import { StatusWord } from '@/components/look/StatusWord';
import { markOfState, type Status, statusWord, wordOfState } from '@/components/look/status';
import { BoreShape } from '@/components/tappet/map/BoreShape';

const statuses = Object.keys(statusWord) as Status[];
/** Every colour replaced by one: what is left must still differ. */
const colourless = (html: string) => html.replace(/var\([^)]*\)/g, 'paint');

describe('marks', () => {
  it('differ from each other without any colour', () => {
    const drawn = statuses.map((status) =>
      colourless(renderToStaticMarkup(<Mark status={status} />)),
    );
    expect(new Set(drawn).size).toBe(statuses.length);
  });

  it('differ inside a bore as well', () => {
    const drawn = statuses.map((status) =>
      colourless(renderToStaticMarkup(<BoreShape x={0} y={0} radius={23} status={status} />)),
    );
    expect(new Set(drawn).size).toBe(statuses.length);
  });

  it('differ in word', () => {
    expect(new Set(Object.values(statusWord)).size).toBe(statuses.length);
  });

  it('are decoration beside a word, and named where they stand alone', () => {
    expect(renderToStaticMarkup(<StatusWord status="outside" word="Breach" />)).toMatch(
      /aria-hidden="true".*Breach/s,
    );
    const alone = renderToStaticMarkup(<Mark status="outside" title />);
    expect(alone).toContain('role="img"');
    expect(alone).toContain('<title>outside</title>');
  });

  it('serve every state of a clause, and no state says "within" that is not', () => {
    const states = [
      'within',
      'outside',
      'too-close',
      'not-measured',
      'could-not-be-reached',
      'no-statement',
      'complies',
      'does-not-comply',
      'judged',
      'waived',
    ] as const;
    expect(states.filter((state) => markOfState(state) === 'within')).toEqual([
      'within',
      'complies',
    ]);
    expect(new Set(states.map(wordOfState)).size).toBe(states.length);
  });
});

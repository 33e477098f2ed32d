import { div, type Rational, rational, sub } from '../quantity/rational';
import { asTyped, type Derived, derive, type Input, shown } from './derived';

export interface DeckStack {
  /** Crankshaft centreline to deck. */
  readonly deckHeight: Input<'length'>;
  /** Centre to centre. */
  readonly rod: Input<'length'>;
  readonly stroke: Input<'length'>;
  /** Piston below the deck plus. */
  readonly deckClearance: Input<'length'>;
}

/** Pin centre to piston crown that makes the stack: deck height − rod − stroke/2 − deck clearance. */
export function compressionHeight(inputs: DeckStack): Derived<'length'> {
  const { deckHeight, rod, stroke, deckClearance } = inputs;
  const less = (from: Rational, ...parts: readonly Rational[]) => parts.reduce(sub, from);
  const result = derive({
    dimension: 'length',
    unit: deckHeight.value.unit,
    inputs: { ...inputs },
    evaluate: (x) => less(x.deckHeight, x.rod, div(x.stroke, rational(2n)), x.deckClearance),
    datum: 'piston at top dead centre',
    working: [],
  });
  const line = `${asTyped(deckHeight)} − ${asTyped(rod)} − ${asTyped(stroke)} ÷ 2 − ${asTyped(deckClearance)}`;
  return { ...result, working: [line, `= ${shown(result.value, 4)}`] };
}

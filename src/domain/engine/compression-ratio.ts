import { add, div, mul, type Rational } from '../quantity/rational';
import { circleArea, cylinderVolume } from './circle';
import { asTyped, type Derived, derive, type Input, shown, writtenOut } from './derived';

export interface Chamber {
  readonly bore: Input<'length'>;
  readonly stroke: Input<'length'>;
  readonly chamber: Input<'volume'>;
  /** Dish and valve pockets plus, dome minus. */
  readonly piston: Input<'volume'>;
  /** Piston below the deck plus, above it minus. */
  readonly deck: Input<'length'>;
  readonly gasketBore: Input<'length'>;
  /** As compressed. */
  readonly gasketThickness: Input<'length'>;
}

export interface CompressionRatio extends Derived<'ratio'> {
  readonly swept: Derived<'volume'>['value'];
  readonly clearance: Derived<'volume'>['value'];
}

const DATUM =
  'one cylinder at top dead centre, gasket as compressed: (swept + clearance) ÷ clearance';

/** (swept + clearance) ÷ clearance; both in any one unit, the clearance above zero. */
export const ratioOfVolumes = (swept: Rational, clearance: Rational): Rational =>
  div(add(swept, clearance), clearance);

type Sizes = { readonly [Name in keyof Chamber]: Rational };

const sweptOf = ({ bore, stroke }: Sizes): Rational => cylinderVolume(bore, stroke);

const clearanceOf = (x: Sizes): Rational =>
  [mul(circleArea(x.bore), x.deck), mul(circleArea(x.gasketBore), x.gasketThickness)].reduce(
    add,
    add(x.chamber, x.piston),
  );

/** The volume left above the piston at top dead centre: a ratio needs it above zero. */
export const clearanceVolume = (inputs: Chamber): Rational => clearanceOf(valuesOf(inputs));

/** Static compression ratio of one cylinder. Throws where nothing is left above the piston. */
export function compressionRatio(inputs: Chamber): CompressionRatio {
  const values = valuesOf(inputs);
  if (clearanceOf(values).n <= 0n) throw new RangeError('no volume is left above the piston');
  const unit = inputs.chamber.value.unit;
  const swept = writtenOut('volume', sweptOf(values), unit);
  const clearance = writtenOut('volume', clearanceOf(values), unit);
  const part = (value: Rational) => shown(writtenOut('volume', value, unit), 3);
  const result = derive({
    dimension: 'ratio',
    unit: '1',
    inputs: { ...inputs },
    evaluate: (x) => ratioOfVolumes(sweptOf(x), clearanceOf(x)),
    datum: DATUM,
    working: [],
  });
  return {
    ...result,
    swept,
    clearance,
    working: [
      `Swept: π/4 × (${asTyped(inputs.bore)})² × ${asTyped(inputs.stroke)} = ${shown(swept, 3)}`,
      `Deck: π/4 × (${asTyped(inputs.bore)})² × ${asTyped(inputs.deck)} = ${part(mul(circleArea(values.bore), values.deck))}`,
      `Gasket: π/4 × (${asTyped(inputs.gasketBore)})² × ${asTyped(inputs.gasketThickness)} = ${part(mul(circleArea(values.gasketBore), values.gasketThickness))}`,
      `Clearance: chamber ${asTyped(inputs.chamber)} + piston ${asTyped(inputs.piston)} + deck + gasket = ${shown(clearance, 3)}`,
      `(swept + clearance) ÷ clearance = ${shown(result.value, 4).replace(' 1', '')} to 1`,
    ],
  };
}

const valuesOf = (x: Chamber): Sizes => ({
  bore: x.bore.value.value,
  stroke: x.stroke.value.value,
  chamber: x.chamber.value.value,
  piston: x.piston.value.value,
  deck: x.deck.value.value,
  gasketBore: x.gasketBore.value.value,
  gasketThickness: x.gasketThickness.value.value,
});

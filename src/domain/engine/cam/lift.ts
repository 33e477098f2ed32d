import { div, mul, sub } from '../../quantity/rational';
import { asTyped, type Derived, derive, type Input, shown } from '../derived';

interface Rocker {
  readonly lobeLift: Input<'length'>;
  readonly rockerRatio: Input<'ratio'>;
}

/** Lobe lift × rocker ratio, nothing taken off. */
export function grossLift({ lobeLift, rockerRatio }: Rocker): Derived<'length'> {
  const result = derive({
    dimension: 'length',
    unit: lobeLift.value.unit,
    inputs: { lobeLift, rockerRatio },
    evaluate: (x) => mul(x.lobeLift, x.rockerRatio),
    datum:
      'at the valve, without lash, on a solid checking lifter; valve train deflection not included',
    working: [],
  });
  const line = `Gross: ${asTyped(lobeLift)} × ${rockerRatio.value.text} = ${shown(result.value, 4)}`;
  return { ...result, working: [line] };
}

/** Gross lift less the lash, which is set at the valve. */
export function netLift(rocker: Rocker, lash: Input<'length'>): Derived<'length'> {
  const gross = grossLift(rocker);
  const result = derive({
    dimension: 'length',
    unit: gross.value.unit,
    inputs: { ...rocker, lash },
    evaluate: (x) => sub(mul(x.lobeLift, x.rockerRatio), x.lash),
    datum: `at the valve, at ${asTyped(lash)} lash, on a solid lifter`,
    working: [],
  });
  const line = `Net: less ${asTyped(lash)} lash = ${shown(result.value, 4)}`;
  return { ...result, working: [...gross.working, line] };
}

/** The ratio that the two lifts imply, both taken at the same cam angle and without lash. */
export function impliedRockerRatio(
  valveLift: Input<'length'>,
  lobeLift: Input<'length'>,
): Derived<'ratio'> {
  const result = derive({
    dimension: 'ratio',
    unit: '1',
    inputs: { valveLift, lobeLift },
    evaluate: (x) => div(x.valveLift, x.lobeLift),
    datum: 'valve travel over lobe travel at the same cam angle, without lash',
    working: [],
  });
  const value = shown(result.value, 4).replace(' 1', '');
  return { ...result, working: [`${asTyped(valveLift)} ÷ ${asTyped(lobeLift)} = ${value}`] };
}

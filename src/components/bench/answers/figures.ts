import type { EngineResponse } from '@/contracts/bench/engine';
import { shownDecimal } from './shown';

/** The figures of an answer that has more than one, named for people. */
export function figuresOf(answer: EngineResponse): readonly (readonly [string, string])[] {
  const deg = (text: string, after = '') => `${text.replace('-', '−')} deg${after}`;
  if ('opens' in answer)
    return [
      ['Opens', deg(answer.opens)],
      ['Closes', deg(answer.closes)],
      ['Centreline', deg(answer.centreline)],
    ];
  if ('overlap' in answer)
    return [
      ['Intake duration', deg(answer.intakeDuration)],
      ['Exhaust duration', deg(answer.exhaustDuration)],
      ['Intake centreline', deg(answer.intakeCentreline, ' after top dead centre')],
      ['Exhaust centreline', deg(answer.exhaustCentreline, ' before top dead centre')],
      ['Overlap', deg(answer.overlap)],
      ['Lobe separation', deg(answer.lobeSeparation, ' of the cam')],
    ];
  if ('cross' in answer)
    return [
      ['Total', `${answer.total} ${answer.unit}`],
      ['Left', `${shownDecimal(answer.left, 2)} %`],
      ['Rear', `${shownDecimal(answer.rear, 2)} %`],
      ['Cross: right front and left rear', `${shownDecimal(answer.cross, 2)} %`],
    ];
  return [];
}

import type { LoggedTemperatures } from '@/domain/inspection/capture/rows';
import { FORM_WORDS, type Form, type Part } from '../../sheet/parts';
import { gaugeFor, gaugesFor, type SetUp } from '../../sheet/set-up';
import type { Sheet, SheetGauge } from '../../sheet/sheet';
import { Temperature } from './Temperature';

interface SetUpPanelProps {
  readonly sheet: Sheet;
  readonly setUp: SetUp;
  readonly setUpAs: (to: Partial<SetUp>) => void;
  /** What is read now: its gauge is chosen first. */
  readonly part: Part | undefined;
}

interface ChooseProps {
  readonly id: string;
  readonly label: string;
  readonly value: string;
  readonly options: readonly (readonly [string, string])[];
  readonly onChoose: (value: string) => void;
}

const Choose = ({ id, label, value, options, onChoose }: ChooseProps) => (
  <div className="field">
    <label htmlFor={id}>{label}</label>
    <select id={id} value={value} onChange={(event) => onChoose(event.target.value)}>
      {options.map(([key, words]) => (
        <option key={key} value={key}>
          {words}
        </option>
      ))}
    </select>
  </div>
);

const gaugeWords = (gauge: SheetGauge, today: string): string => {
  const overdue = gauge.dueOn !== undefined && gauge.dueOn < today;
  const state = gauge.withdrawn ? ', withdrawn' : overdue ? ', overdue' : '';
  return `${gauge.code} ${gauge.name}${state}`;
};

/** Which gauge of the crib is taken for what, unless a part has one of its own. */
const GAUGES = [
  {
    key: 'micrometerId',
    id: 'micrometer',
    label: 'Lifters with',
    kinds: ['micrometer', 'caliper', 'other'],
  },
  {
    key: 'boreGaugeId',
    id: 'bore-gauge',
    label: 'Bores with',
    kinds: ['dial-bore-gauge', 'telescoping-gauge', 'micrometer', 'caliper', 'other'],
  },
  { key: 'ringId', id: 'ring', label: 'Setting ring', kinds: ['setting-ring'] },
  {
    key: 'otherGaugeId',
    id: 'other-gauge',
    label: 'Everything else with',
    kinds: ['micrometer', 'caliper', 'scale', 'other'],
  },
] as const;

/** How the sheet is taken: kept on this device, and written into every row that it touches. */
export const SetUpPanel = ({ sheet, setUp, setUpAs, part }: SetUpPanelProps) => {
  const today = sheet.servedAt.slice(0, 10);
  const of = (kinds: readonly string[]) =>
    sheet.gauges
      .filter((gauge) => kinds.includes(gauge.kind))
      .map((gauge) => [gauge.id, gaugeWords(gauge, today)] as const);
  const temperature = (key: keyof LoggedTemperatures) => (value: LoggedTemperatures['bore']) => {
    const { [key]: _old, ...others } = setUp.temperatures;
    setUpAs({ temperatures: value === undefined ? others : { ...others, [key]: value } });
  };
  const usual = ['lifter-body-diameter', 'foot-diameter', 'tappet-bore-diameter'];
  const own = part !== undefined && !usual.includes(part.quantity) ? part.quantity : undefined;
  return (
    <div>
      {own !== undefined && (
        <Choose
          id="own-gauge"
          label={`${part?.label ?? ''} with`}
          value={gaugeFor(setUp, own, sheet.gauges)?.id ?? ''}
          options={gaugesFor(own, sheet.gauges).map(
            (gauge) => [gauge.id, gaugeWords(gauge, today)] as const,
          )}
          onChoose={(id) => setUpAs({ gaugeIds: { ...setUp.gaugeIds, [own]: id } })}
        />
      )}
      <Choose
        id="form"
        label="How much"
        value={setUp.form}
        options={Object.entries(FORM_WORDS)}
        onChoose={(form) => setUpAs({ form: form as Form })}
      />
      <Choose
        id="advice"
        label="Advisory clauses"
        value={setUp.advice ? 'yes' : 'no'}
        options={[
          ['no', 'Left to who wants them'],
          ['yes', 'Read for them too'],
        ]}
        onChoose={(advice) => setUpAs({ advice: advice === 'yes' })}
      />
      <Choose
        id="method"
        label="Bores by"
        value={setUp.method}
        options={[
          ['comparative', 'Difference from a zero'],
          ['absolute', 'Diameter off the gauge'],
        ]}
        onChoose={(method) => setUpAs({ method: method as SetUp['method'] })}
      />
      {setUp.method === 'comparative' && (
        <Choose
          id="zeroed-on"
          label="Zero on"
          value={setUp.zeroedOn}
          options={[
            ['ring', 'A setting ring: one zero a bank'],
            ['lifter', 'The bore’s own lifter, in the micrometer'],
          ]}
          onChoose={(zeroedOn) => setUpAs({ zeroedOn: zeroedOn as SetUp['zeroedOn'] })}
        />
      )}
      {GAUGES.map(({ key, id, label, kinds }) => (
        <Choose
          key={key}
          id={id}
          label={label}
          value={setUp[key]}
          options={of(kinds)}
          onChoose={(chosen) => setUpAs({ [key]: chosen })}
        />
      ))}
      <Temperature
        id="t-bore"
        label="Block, with its unit"
        given={setUp.temperatures.bore}
        onGive={temperature('bore')}
      />
      <Temperature
        id="t-lifter"
        label="Lifters"
        given={setUp.temperatures.lifter}
        onGive={temperature('lifter')}
      />
      <Choose
        id="hand"
        label="Keypad"
        value={setUp.hand}
        options={[
          ['right', 'On the right'],
          ['left', 'On the left'],
        ]}
        onChoose={(hand) => setUpAs({ hand: hand as SetUp['hand'] })}
      />
    </div>
  );
};

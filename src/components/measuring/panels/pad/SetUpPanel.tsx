import { useState } from 'react';
import type { LoggedTemperatures } from '@/domain/inspection/capture/rows';
import { parseQuantity } from '@/domain/quantity/parse';
import { FORM_WORDS, type Form, type Part } from '../../sheet/parts';
import { gaugeFor, gaugesFor, type SetUp } from '../../sheet/set-up';
import type { Sheet, SheetGauge } from '../../sheet/sheet';

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

const Temperature = ({
  id,
  label,
  given,
  onGive,
}: {
  readonly id: string;
  readonly label: string;
  readonly given: LoggedTemperatures['bore'];
  readonly onGive: (value: LoggedTemperatures['bore']) => void;
}) => {
  const [text, setText] = useState(given === undefined ? '' : `${given.text} ${given.unit}`);
  const [fault, setFault] = useState<string>();
  const take = () => {
    if (text.trim() === '') {
      setFault(undefined);
      onGive(undefined);
      return;
    }
    const read = parseQuantity(text, { dimension: 'temperature' });
    setFault(read.ok ? undefined : read.failure.detail);
    if (read.ok) onGive({ text: read.value.text, unit: read.value.unit });
  };
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      {fault !== undefined && <p className="field-error">{fault}</p>}
      <input
        id={id}
        className="input-num"
        inputMode="text"
        placeholder="74 °F"
        value={text}
        aria-invalid={fault === undefined ? undefined : 'true'}
        onChange={(event) => setText(event.target.value)}
        onBlur={take}
      />
    </div>
  );
};

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
      <Choose
        id="micrometer"
        label="Lifters with"
        value={setUp.micrometerId}
        options={of(['micrometer', 'caliper', 'other'])}
        onChoose={(micrometerId) => setUpAs({ micrometerId })}
      />
      <Choose
        id="bore-gauge"
        label="Bores with"
        value={setUp.boreGaugeId}
        options={of(['dial-bore-gauge', 'telescoping-gauge', 'micrometer', 'caliper', 'other'])}
        onChoose={(boreGaugeId) => setUpAs({ boreGaugeId })}
      />
      <Choose
        id="ring"
        label="Setting ring"
        value={setUp.ringId}
        options={of(['setting-ring'])}
        onChoose={(ringId) => setUpAs({ ringId })}
      />
      <Choose
        id="other-gauge"
        label="Everything else with"
        value={setUp.otherGaugeId}
        options={of(['micrometer', 'caliper', 'scale', 'other'])}
        onChoose={(otherGaugeId) => setUpAs({ otherGaugeId })}
      />
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

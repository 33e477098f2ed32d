import type { Role } from '@/domain/access/permission';

/** The demo's people are invented, like everything else in it. */
export interface DemoPerson {
  /** Subject at the local identity provider. */
  readonly subject: string;
  readonly name: string;
  readonly email: string;
  /** What the person does in the demo, said on the page to sign in. */
  readonly part: string;
  readonly roles: readonly Role[];
  readonly siteAdmin?: boolean;
}

const person = (name: string, part: string, ...roles: Role[]): DemoPerson => {
  const subject = name.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replaceAll(' ', '.');
  return { subject, name, email: `${subject}@example.org`, part, roles };
};

export const ADMINISTRATOR: DemoPerson = {
  ...person('Ada Thornmere', 'site administrator, opens series'),
  siteAdmin: true,
};

export const OFFICIAL = person(
  'Ilse Törnkvist',
  'series official, decides and publishes',
  'official',
);
export const SECOND_OFFICIAL = person('Jory Vantreese', 'second series official', 'official');
export const CHIEF = person('Marit Quell', 'chief inspector, keeps the gauges', 'chief-inspector');
export const INSPECTOR = person('Oona Brannick', 'inspector in bay 2', 'inspector');
export const SECOND_INSPECTOR = person('Dov Aranet', 'inspector in bay 1', 'inspector');
export const BUILDER = person('Edda Sorrel', 'engine builder', 'builder');
export const PANEL = person('Tamsin Orrick', 'member of the appeals panel', 'panel');

export interface DemoCompetitor {
  readonly person: DemoPerson;
  readonly carNumber: string;
  readonly className: 'Street Eight' | 'Modified Four';
  readonly engine: string;
  readonly position: number;
}

const enters = (
  name: string,
  carNumber: string,
  className: DemoCompetitor['className'],
  engine: string,
  position: number,
): DemoCompetitor => ({
  person: person(name, `competitor, car ${carNumber}, ${className}`, 'competitor'),
  carNumber,
  className,
  engine,
  position,
});

export const COMPETITORS: readonly DemoCompetitor[] = [
  enters('Wren Halloway', '12J', 'Street Eight', 'VR-2231', 1),
  enters('Perrin Oakhurst', '408', 'Street Eight', 'PO-8', 2),
  enters('Lio Bramwell', '7', 'Modified Four', 'LB-4', 1),
  enters('Sable Nordahl', '31', 'Modified Four', 'SN-22', 2),
  enters('Corin Weft', '88', 'Street Eight', 'CW-3', 3),
  enters('Junia Ashgrove', '19K', 'Modified Four', 'JA-19', 3),
  enters('Bastian Quorne', '204', 'Modified Four', 'BQ-1', 4),
  enters('Nell Farrowby', '55', 'Street Eight', 'NF-55', 4),
  enters('Odo Marchbank', '3', 'Street Eight', 'OM-7', 5),
  enters('Ysolde Kerrigan', '61', 'Modified Four', 'YK-6', 5),
  enters('Tobin Larkspur', '17', 'Street Eight', 'TL-17', 6),
  enters('Greta Silverlock', '92', 'Modified Four', 'GS-2', 6),
];

export const EVERYBODY: readonly DemoPerson[] = [
  OFFICIAL,
  SECOND_OFFICIAL,
  CHIEF,
  INSPECTOR,
  SECOND_INSPECTOR,
  ...COMPETITORS.map((competitor) => competitor.person),
  BUILDER,
  PANEL,
  ADMINISTRATOR,
];

import type { Composition } from '@/composition';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { findRules } from '@/services/rulebook/find-rules';
import { type Oddities, trueEngine } from './make/engine';
import { COMPETITORS, type DemoCompetitor, EVERYBODY, INSPECTOR, SECOND_INSPECTOR } from './people';
import { openStage, type Stage } from './stage';
import { writeBuilders } from './write/write-builders';
import { writeChecks, writeCustody } from './write/write-custody';
import { writeEvents, writeGauges } from './write/write-events';
import { type DemoInspection, writeInspection } from './write/write-inspections';
import { type PaperworkEnd, writePaperwork } from './write/write-paperwork';
import { writePeople } from './write/write-people';
import { type DemoClasses, writeRulebooks } from './write/write-rulebooks';
import { writeVerdict } from './write/write-verdicts';

const DAY = 86_400_000;

/** What is odd about whose engine; everybody else's is as it should be. */
const ODDITIES: Readonly<Record<string, Oddities>> = {
  // Feet that let a faster lobe work: the mandatory clause is breached.
  '12J': { foot: { '3 exhaust': 8485, '5 exhaust': 8481, '6 exhaust': 8479 } },
  // One loose lifter: advice, disqualifies nobody.
  '408': { clearance: { '3 exhaust': 22 } },
  // One body within U of its limit.
  '7': { body: { '2 intake': 8426 } },
};

const ENDS: Readonly<Record<string, PaperworkEnd>> = {
  '55': 'handed-in',
  '61': 'handed-in',
  '17': 'returned',
  '92': 'draft',
};

const sizeOf = ({ className }: DemoCompetitor) =>
  className === 'Street Eight'
    ? { bore: '4.0310', stroke: '3.4800', displacement: '355.3' }
    : { bore: '3.7800', stroke: '3.1100', displacement: '139.6' };

const layoutOf = ({ className }: DemoCompetitor) => {
  const name = className === 'Street Eight' ? 'V8, odd cylinders left' : 'Inline four';
  const layout = GENERIC_LAYOUTS.find((one) => one.name.startsWith(name));
  if (layout === undefined) throw new Error(`There is no position map named ${name}.`);
  return layout;
};

const castingOf = ({ className, position }: DemoCompetitor) =>
  `${className === 'Street Eight' ? '41' : '27'}-77${30 + position}`;

const engineOf = (stage: Stage, competitor: DemoCompetitor) =>
  trueEngine(positionsOf(layoutOf(competitor)), stage.chance, ODDITIES[competitor.carNumber]);

const rulesOf = async (stage: Stage, seriesId: string, classId: string): Promise<RulesInForce> => {
  const found = await findRules(stage.ports().db, seriesId, classId, stage.clock.now());
  if (found === undefined) throw new Error('The demo’s rulebook is not in force.');
  return found.rules;
};

const writeAllPaperwork = async (stage: Stage, seriesId: string, classes: DemoClasses) => {
  const engines = new Map<string, ReturnType<typeof trueEngine>>();
  for (const [at, competitor] of COMPETITORS.entries()) {
    stage.clock.set(new Date(stage.lastEvent.getTime() - (20 - at) * DAY));
    const classId =
      competitor.className === 'Street Eight' ? classes.streetEight : classes.modifiedFour;
    const engine = engineOf(stage, competitor);
    engines.set(competitor.carNumber, engine);
    await writePaperwork(stage, {
      seriesId,
      classId,
      rules: await rulesOf(stage, seriesId, classId),
      competitor,
      layout: layoutOf(competitor),
      engine,
      casting: castingOf(competitor),
      size: sizeOf(competitor),
      end: ENDS[competitor.carNumber] ?? 'accepted',
    });
  }
  return engines;
};

const EVENING: Readonly<Record<string, Pick<DemoInspection, 'inspector' | 'bay' | 'end'>>> = {
  '12J': { inspector: INSPECTOR, bay: '2', end: 'signed' },
  '408': { inspector: SECOND_INSPECTOR, bay: '1', end: 'signed' },
  '7': { inspector: SECOND_INSPECTOR, bay: '1', end: 'signed' },
  '88': { inspector: INSPECTOR, bay: '2', end: 'held-hot' },
};

/**
 * Writes the demo's series through the use cases that everybody uses, by a clock that is set back:
 * one event that is over with inspections in every state, one to come. Says whom one can sign in as.
 */
export const seed = async (app: Composition) => {
  const stage = openStage(app);
  const { seriesId } = await writePeople(stage);
  const classes = await writeRulebooks(stage, seriesId);
  const gauges = await writeGauges(stage, seriesId);
  const engines = await writeAllPaperwork(stage, seriesId, classes);
  await writeBuilders(stage);
  const picked = await writeEvents(stage, seriesId, classes);
  const inspectionOf = new Map<string, string>();
  const first = picked.find(({ competitor }) => competitor.carNumber === '12J');
  if (first !== undefined) await writeChecks(stage, seriesId, gauges, first.inspectionId);
  for (const { competitor, inspectionId } of picked) {
    const { carNumber, person } = competitor;
    inspectionOf.set(carNumber, inspectionId);
    const how = EVENING[carNumber];
    if (how === undefined) continue;
    stage.clock.pass(600);
    await writeInspection(stage, {
      inspectionId,
      ...how,
      layout: layoutOf(competitor),
      engine: engines.get(carNumber) ?? [],
      gauges,
      casting: castingOf(competitor),
      size: sizeOf(competitor),
      witness: person.name,
    });
  }
  if (first !== undefined) await writeCustody(stage, first.inspectionId);
  stage.clock.set(new Date(stage.lastEvent.getTime() + 15 * 3_600_000));
  await writeVerdict(stage, seriesId, inspectionOf.get('408') ?? '', {
    decision: 'no-breach',
    reasons:
      'Every mandatory clause that was checked is met. One bore is loose; the clause is advice.',
  });
  await writeVerdict(stage, seriesId, inspectionOf.get('12J') ?? '', {
    decision: 'breach',
    clauses: ['4.3'],
    penalty: { row: 'A', step: 1 },
    reasons:
      'The feet of three lifters are larger than their bodies by more than the clause allows, uncertainty included.',
  });
  return EVERYBODY.map(({ subject, name, email, part }) => ({ subject, name, email, part }));
};

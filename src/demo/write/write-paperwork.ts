import { EMPTY_DRAFT, type PaperworkDraft, withAnswer, withCells } from '@/domain/paperwork/draft';
import { readSheet } from '@/domain/paperwork/sheet/read-sheet';
import { sheetTemplate } from '@/domain/paperwork/sheet/template';
import type { Question, SheetForm } from '@/domain/rulebook/form/form';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { type BoreLayout, boreName } from '@/domain/tappet/layout/bore-layout';
import { createEngine } from '@/services/engine/create-engine';
import { keepFile } from '@/services/file/keep-file';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';
import { saveDraft } from '@/services/paperwork/save-draft';
import { PLAIN_FORM, writeCsv } from '@/services/paperwork/sheet/csv/write-csv';
import { startPaperwork } from '@/services/paperwork/start-paperwork';
import { micrometer, SPOTS, type TrueBore } from '../make/engine';
import { drawPhotograph } from '../make/photograph';
import { type DemoCompetitor, OFFICIAL } from '../people';
import { done, type Stage } from '../stage';

export type PaperworkEnd = 'draft' | 'handed-in' | 'accepted' | 'returned';

export interface DemoPaperwork {
  readonly seriesId: string;
  readonly classId: string;
  readonly rules: RulesInForce;
  readonly competitor: DemoCompetitor;
  readonly layout: BoreLayout;
  readonly engine: readonly TrueBore[];
  readonly casting: string;
  readonly size: { readonly bore: string; readonly stroke: string; readonly displacement: string };
  readonly end: PaperworkEnd;
}

const answerTo = (question: Question, demo: DemoPaperwork, rules: RulesInForce) => {
  if (question.kind === 'number') {
    return question.quantity === 'displacement' ? demo.size.displacement : '0';
  }
  if (question.kind === 'text') return demo.casting;
  const requirement = rules.clauses.find((clause) =>
    question.clauses.includes(clause.number),
  )?.requirement;
  if (requirement?.kind === 'choice') return requirement.allowed[0] ?? '';
  return requirement?.kind === 'yes-no' ? requirement.required : '';
};

/** What the builder's sheet says of one place: the engine as it was measured on the bench, in a mean of places. */
const cellFor = (demo: DemoPaperwork, form: SheetForm, key: string, quantity: string): string => {
  if (form.per === 'cylinder' || quantity === 'cylinder-bore' || quantity === 'stroke') {
    return quantity === 'stroke' ? demo.size.stroke : demo.size.bore;
  }
  const bore = demo.engine.find(({ position }) => boreName(position) === key);
  if (bore === undefined) return '';
  const mean = SPOTS.reduce((sum, spot) => sum + bore.bore[spot], 0) / SPOTS.length;
  const named: Readonly<Record<string, string>> = {
    'lifter-body-diameter': micrometer(bore.body),
    'foot-diameter': micrometer(Math.min(bore.foot, bore.body + 4)),
    'tappet-bore-diameter': micrometer(Math.round(mean)),
    'valve-lift': bore.position.valve === 'intake' ? '0.4580' : '0.4620',
  };
  return named[quantity] ?? '';
};

const sheetRows = (demo: DemoPaperwork, form: SheetForm): readonly (readonly string[])[] => {
  const about = { carNumber: '', reference: '', className: '', paperworkId: '' };
  const { heading, places } = sheetTemplate({ form, layout: demo.layout }, about, 'inch');
  return [
    heading,
    ...places.map((place) => [
      place,
      ...form.columns.map(({ quantity }) => cellFor(demo, form, place, quantity)),
    ]),
  ];
};

/** One engine's paperwork, from the empty form to where the demo leaves it. */
export const writePaperwork = async (stage: Stage, demo: DemoPaperwork): Promise<void> => {
  const { seriesId, classId, rules, competitor, layout, end } = demo;
  const person = () => stage.actor(competitor.person);
  const engineId = stage.uuid();
  stage.clock.pass(600);
  done(
    `add engine ${competitor.engine}`,
    await createEngine(stage.ports(), person(), {
      act: stage.uuid(),
      id: engineId,
      reference: competitor.engine,
      layout,
      blockCasting: demo.casting,
      headCastings: `${demo.casting}-H`,
      serial: '',
    }),
  );
  const paperworkId = stage.uuid();
  done(
    `start paperwork of ${competitor.engine}`,
    await startPaperwork(stage.ports(), person(), {
      act: stage.uuid(),
      id: paperworkId,
      seriesId,
      classId,
      engineId,
      carNumber: competitor.carNumber,
    }),
  );
  const form = paperworkForm(rules);
  const half = end === 'draft';
  const keep = async (
    purpose: 'photograph' | 'sheet',
    item: string,
    name: string,
    bytes: Uint8Array,
  ) => {
    const kept = done(
      `keep ${name}`,
      await keepFile(stage.ports(), person(), {
        act: stage.uuid(),
        fileId: stage.uuid(),
        paperworkId,
        purpose,
        item,
        name,
        declaredType: purpose === 'photograph' ? 'image/jpeg' : 'text/csv',
        declaredBytes: bytes.length,
        bytes,
      }),
    );
    if (kept.state === 'refused') throw new Error(`${name}: ${kept.refusedBecause}`);
    return kept.fileId;
  };
  let draft: PaperworkDraft = EMPTY_DRAFT;
  for (const [at, question] of form.questions.entries()) {
    if (half && at >= 2) continue;
    const unit = question.kind === 'number' ? { unit: question.unit } : {};
    draft = withAnswer(draft, {
      subject: question.subject,
      position: question.per === 'car' ? 'car' : 'engine',
      typed: answerTo(question, demo, rules),
      ...unit,
    });
  }
  for (const [at, shot] of form.photographs.entries()) {
    if (half && at >= 1) continue;
    const picture = await drawPhotograph(
      competitor.carNumber,
      shot.heading,
      at + competitor.position,
    );
    await keep('photograph', shot.subject, `${shot.subject}.jpg`, picture);
  }
  for (const sheet of form.sheets.filter((one) => one.columns.length > 0)) {
    const rows = sheetRows(demo, sheet).map((row) => [...row]);
    // The unfinished one has a slip of the key in it.
    if (half && rows[3] !== undefined && rows[3].length > 1) rows[3][1] = '0.84.41';
    const name = `${sheet.subject}.csv`;
    const fileId = await keep('sheet', sheet.subject, name, writeCsv(rows, PLAIN_FORM));
    const read = readSheet(rows, { form: sheet, layout }, { fileId, name });
    draft = withCells(draft, sheet.subject, read.cells);
  }
  const saved = done(
    `save paperwork of ${competitor.engine}`,
    await saveDraft(stage.ports(), person(), { act: stage.uuid(), paperworkId, version: 1, draft }),
  );
  if (half) return;
  stage.clock.pass(1200);
  const receipt = done(
    `hand in paperwork of ${competitor.engine}`,
    await handInPaperwork(stage.ports(), person(), {
      act: stage.uuid(),
      paperworkId,
      version: saved.version,
    }),
  );
  if (end === 'handed-in') return;
  stage.clock.pass(7200);
  done(
    `decide paperwork of ${competitor.engine}`,
    await decidePaperwork(stage.ports(), stage.actor(OFFICIAL), {
      act: stage.uuid(),
      paperworkId,
      number: receipt.number,
      decision: end,
      remarks:
        end === 'returned'
          ? [
              {
                item: form.photographs[0]?.subject ?? 'general',
                text: 'The scale is not in the picture. Photograph the rack once more with it.',
              },
            ]
          : [],
    }),
  );
};

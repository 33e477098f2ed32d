import type { Written } from '../quantity/dimension';
import type { Quantity } from '../quantity/quantity';
import { type PlainDocument, toDocument } from '../rulebook/document';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import type { BoreResult, InspectionAssessment } from './assess-inspection';
import type { GaugeRecord } from './capture/gauge-record';
import type { RemarkRow, ZeroRow } from './capture/rows';
import type { Revision } from './finding';
import type { SetResult } from './measure/measure-position';
import { rackOf, signedReturnOf } from './rack/rack';
import type { SecondSet } from './second-set/second-sets';

/** Who stood by, and whether they signed. */
export interface Witness {
  readonly name: string;
  readonly role: string;
  readonly outcome: 'signed' | 'refused' | 'absent';
  readonly remark?: string | undefined;
}

/** What goes into the report beside the assessment; every hash is SHA-256 in hexadecimal. */
export interface ReportParts {
  readonly inspectionId: string;
  readonly carNumber: string;
  readonly className: string;
  readonly event: string;
  readonly pickedBecause: string;
  readonly inspector: { readonly id: string; readonly name: string };
  readonly witness: Witness;
  readonly revision: Revision;
  readonly rulesHash: string;
  /** Head of the chain of all batches, struck readings included. */
  readonly chainHead: string;
  readonly layout: BoreLayout;
  readonly zeros: readonly ZeroRow[];
  readonly remarks: readonly RemarkRow[];
  readonly gauges: readonly GaugeRecord[];
  readonly photographs: readonly {
    readonly id: string;
    readonly sha256: string;
    readonly words: string;
  }[];
  /** ISO 8601 instant in UTC. */
  readonly signedAt: string;
}

const written = (quantity: Quantity | null | undefined): Written | undefined =>
  quantity === null || quantity === undefined
    ? undefined
    : { text: quantity.text, unit: quantity.unit };

const three = (figures: { mean: Quantity; min: Quantity; max: Quantity } | null | undefined) =>
  figures === null || figures === undefined
    ? undefined
    : { mean: written(figures.mean), min: written(figures.min), max: written(figures.max) };

/** One set's results as plain data: lengths as written, the budget in metres. */
const plainSet = ({ set, measurement, foot }: SetResult) => ({
  set: set.set,
  method: set.sheet.method,
  run: set.runId,
  clearance: three(measurement.clearance),
  clearanceAt20C: three(measurement.clearanceAt20C),
  outOfRound: written(measurement.outOfRound),
  taper:
    measurement.taper === null
      ? undefined
      : {
          depthMeans: written(measurement.taper.depthMeans),
          worstAxis: written(measurement.taper.worstAxis),
          signed: written(measurement.taper.signed),
          shape: measurement.taper.shape,
        },
  footLessBody: written(foot?.difference),
  drift: written(measurement.drift),
  redo: measurement.redo,
  standardUncertaintyInMetres: measurement.standardUncertainty,
  degreesOfFreedom: measurement.degreesOfFreedom,
  budget: measurement.budget.map(({ name, contribution, share, sentence }) => ({
    name,
    contributionInMetres: contribution,
    share,
    sentence,
  })),
  missing: measurement.missing,
  warnings: measurement.warnings,
  readings: set.used.map(({ row }) => row.id),
  superseded: set.superseded.map(({ row }) => row.id),
});

const plainSecondSet = ({ set, firstBy, secondBy, alone, agreements }: SecondSet) => ({
  set,
  firstBy,
  secondBy,
  // By one person alone it is a re-zeroed repeat, not a second opinion.
  taken: alone ? 'repeat-by-the-same-inspector' : 'by-another-inspector',
  agreements,
});

/** One bore as it stands in a report: its sets, second ones beside the first, and which a person chose. */
export const plainBore = ({ key, position, sets, secondSets, choice }: BoreResult) => ({
  key,
  position,
  sets: sets.map(plainSet),
  ...(secondSets.length > 0 && { secondSets: secondSets.map(plainSecondSet) }),
  ...(choice && { stands: String(choice.stands), standsBecause: choice.reason }),
});

/**
 * The report that is signed: rules, map, every row with what became of it, gauges with certificates,
 * results, findings. Plain data without numbers, to be canonicalised (RFC 8785) and hashed.
 */
export const reportDocument = (
  parts: ReportParts,
  assessment: InspectionAssessment,
): PlainDocument => {
  const lifters = rackOf(parts.layout, parts.remarks);
  return toDocument({
    document: 'tagwire/report',
    version: '1',
    ...parts,
    domainVersion: assessment.domainVersion,
    readings: assessment.judged,
    bores: assessment.bores.map(plainBore),
    completeness: assessment.completeness,
    redo: assessment.redo,
    ...(lifters.some(({ state }) => state !== 'in-engine') && {
      lifters: { rack: lifters, signedFor: signedReturnOf(parts.remarks) },
    }),
    findings: assessment.findings,
    caution:
      'Findings support a decision by the series’ officials; they are no certification that an engine is safe.',
  });
};

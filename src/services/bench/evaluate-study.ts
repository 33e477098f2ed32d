import type { StudyRequest, StudyResponse } from '@/contracts/bench/study';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { oneWay } from '@/domain/statistics/one-way';
import { wilson } from '@/domain/statistics/proportion';
import { averageRange } from '@/domain/statistics/study/average-range';
import { blandAltman } from '@/domain/statistics/study/bland-altman';
import { crossedAnova } from '@/domain/statistics/study/crossed-anova';
import { iso5725 } from '@/domain/statistics/study/iso5725';
import { kappa } from '@/domain/statistics/study/kappa';
import { summary } from '@/domain/statistics/summary';
import { StudyTaker } from './take-study';

/** A study by its method; the numbers are taken exactly as written. */
export function evaluateStudy(request: StudyRequest): Result<StudyResponse, Failure> {
  const take = new StudyTaker();
  const evaluate = prepare(request, take);
  return take.faults.length > 0 ? fail(invalid(take.faults)) : ok(evaluate());
}

/** Reads the numbers now; the answer is worked out only when none of them was refused. */
function prepare(request: StudyRequest, take: StudyTaker): () => StudyResponse {
  switch (request.method) {
    case 'summary': {
      const values = take.series(...named(request.data, 'values'));
      return () => summary(values);
    }
    case 'one-way': {
      const groups = take.groups(...named(request.data, 'groups'));
      return () => {
        const { ssBetween, ssWithin, F, p, dfBetween, dfWithin } = oneWay(groups);
        return { ssBetween, ssWithin, F, p, dfBetween, dfWithin };
      };
    }
    case 'average-range':
    case 'anova': {
      const readings = take.crossed(...named(request.data, 'data'));
      return () => {
        const study = request.method === 'anova' ? crossedAnova(readings) : averageRange(readings);
        const { method, EV, AV, GRR, PV, TV, ndc } = study;
        const pooling = 'pooled' in study ? { pooled: study.pooled } : {};
        return { method, EV, AV, GRR, PV, TV, ndc, ...pooling };
      };
    }
    case 'iso5725': {
      const laboratories = take.groups(...named(request.data, 'data'));
      return () => {
        const {
          laboratories: _laboratories,
          betweenLaboratorySd: _sd,
          ...precision
        } = iso5725(laboratories);
        return precision;
      };
    }
    case 'bland-altman': {
      const a = take.series(request.data.a, '/data/a');
      const b = take.series(request.data.b, '/data/b');
      if (a.length !== b.length)
        take.refuse('/data/b', 'Give as many values as in a: they are pairs.');
      return () => {
        const { bias, sd, lower, upper, multiplier } = blandAltman(a, b, request.data.multiplier);
        return { bias, sd, lower, upper, multiplier };
      };
    }
    case 'kappa': {
      const table = take.square(...named(request.data, 'table'));
      return () => ({ kappa: kappa(table).kappa });
    }
    case 'wilson': {
      const { count, n, level } = request.data;
      if (count > n) take.refuse('/data/count', 'The count is larger than n.');
      return () => wilson(count, n, level);
    }
  }
}

type ListOf<D> = Extract<D, readonly unknown[]>;

/** The list and its place, whether it stands alone or under its name. */
function named<D>(data: D, key: string): readonly [ListOf<D>, string] {
  return Array.isArray(data)
    ? [data as ListOf<D>, '/data']
    : [(data as Readonly<Record<string, ListOf<D>>>)[key] as ListOf<D>, `/data/${key}`];
}

import type { Fault } from '@/domain/failure';
import { readNumber } from '@/domain/quantity/number-text';
import { DECIMAL } from '@/domain/statistics/decimal';
import { LARGEST_SUBGROUP } from '@/domain/statistics/study/range-constants';
import type { Figure } from './take';

const MOST_FAULTS = 50;
const LARGEST_STUDY = 20_000;

/** Takes the numbers of a study as plain decimal texts and notes what is wrong with its shape. */
export class StudyTaker {
  readonly faults: Fault[] = [];

  refuse(pointer: string, detail: string): void {
    if (this.faults.length < MOST_FAULTS) this.faults.push({ pointer, detail });
  }

  series(figures: readonly Figure[], pointer: string): string[] {
    return figures.map((figure, i) => this.#decimal(figure, `${pointer}/${i}`));
  }

  /** Two groups or more, none empty, and a repeat in one of them. */
  groups(rows: readonly (readonly Figure[])[], pointer: string): string[][] {
    const values = rows.reduce((count, row) => count + row.length, 0);
    if (values > LARGEST_STUDY) {
      this.refuse(pointer, `At most ${LARGEST_STUDY} values fit here.`);
      return [];
    }
    if (values <= rows.length)
      this.refuse(
        pointer,
        'One group at least needs two values: nothing shows the scatter within.',
      );
    return rows.map((row, i) => {
      if (row.length === 0) this.refuse(`${pointer}/${i}`, 'This group is empty.');
      return this.series(row, `${pointer}/${i}`);
    });
  }

  /** Appraiser × trial × part, every row as long as the first. */
  crossed(data: readonly (readonly (readonly Figure[])[])[], pointer: string): string[][][] {
    const trials = data[0]?.length ?? 0;
    const parts = data[0]?.[0]?.length ?? 0;
    for (const [name, size] of Object.entries({ trials, parts })) {
      if (size < 2 || size > LARGEST_SUBGROUP)
        this.refuse(pointer, `A study has 2 to ${LARGEST_SUBGROUP} ${name}, not ${size}.`);
    }
    if (this.faults.length > 0) return [];
    return data.map((appraiser, a) => {
      if (appraiser.length !== trials)
        this.refuse(`${pointer}/${a}`, `Give ${trials} trials, as for the first appraiser.`);
      return appraiser.map((row, t) => {
        if (row.length !== parts)
          this.refuse(`${pointer}/${a}/${t}`, `Give ${parts} parts, as in the first trial.`);
        return this.series(row, `${pointer}/${a}/${t}`);
      });
    });
  }

  square(table: readonly (readonly number[])[], pointer: string): readonly (readonly number[])[] {
    table.forEach((row, i) => {
      if (row.length !== table.length)
        this.refuse(`${pointer}/${i}`, `Give ${table.length} counts: the table is square.`);
    });
    if (table.every((row) => row.every((count) => count === 0)))
      this.refuse(pointer, 'Nothing was counted.');
    return table;
  }

  #decimal(figure: Figure, pointer: string): string {
    const { plain } = readNumber(String(figure));
    if (plain !== undefined && DECIMAL.test(plain)) return plain;
    this.refuse(pointer, `"${figure}" is not a number, or could be two.`);
    return '0';
  }
}

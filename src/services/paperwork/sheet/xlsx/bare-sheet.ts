import { cellName } from '@/domain/paperwork/sheet/header/column-meaning';
import type { ScannedCell, ScannedSheet } from './scan-sheet';

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';

const isNumber = (content: string): boolean => {
  const text = /^<(?:\w+:)?v[^>]*>([^<]*)</.exec(content)?.[1]?.trim() ?? '';
  return text !== '' && Number.isFinite(Number(text));
};

/** An error's name (`#DIV/0!`), and a number that is none, are text to whoever reads on. */
const typeOf = ({ type, content }: ScannedCell): string =>
  type === 'e' || (type === 'n' && !isNumber(content)) ? 'str' : type;

const withoutPrefix = (content: string): string =>
  content.replace(/<(\/?)\w+:(\w+)/g, (_all, slash: string, tag: string) => `<${slash}${tag}`);

/** The sheet as XML with what was found and nothing else: every row and cell named, no formulas. */
export const bareSheet = ({ rows }: ScannedSheet): string => {
  const lines = rows.map((row) => {
    const cells = row.cells
      .filter(({ content }) => content !== '')
      .map((cell) => {
        const style = /^\d{1,5}$/.test(cell.style ?? '') ? ` s="${cell.style}"` : '';
        const at = cellName(row.number, cell.column);
        return `<c r="${at}" t="${typeOf(cell)}"${style}>${withoutPrefix(cell.content)}</c>`;
      });
    return `<row r="${row.number + 1}">${cells.join('')}</row>`;
  });
  return `<worksheet xmlns="${MAIN}"><sheetData>${lines.join('')}</sheetData></worksheet>`;
};

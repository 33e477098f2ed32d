/** @typedef {import('./flat-sheet.mjs').Cell} Cell */
/** @typedef {import('./flat-sheet.mjs').Reading} Reading */
/** @typedef {import('./flat-sheet.mjs').Sheet} Sheet */

/**
 * One way in which people make their sheets.
 *
 * @typedef {object} Shape
 * @property {string} name
 * @property {string} what
 * @property {readonly Sheet[]} sheets
 * @property {number} [read] which of them must be read; the first where absent
 * @property {'en' | 'de'} [locale] in which numbers are shown; `en` where absent
 * @property {readonly Csv[]} csv
 * @property {Record<string, { quantity: string, unit: string }>} [columns] headings that a person has to explain
 * @property {readonly string[]} [notes] places that must be named as not taken
 * @property {readonly string[]} [csvNotes] the same for the CSV file, where it differs
 */

/**
 * How a CSV file is saved.
 *
 * @typedef {object} Csv
 * @property {string} suffix
 * @property {string} delimiter
 * @property {'utf-8' | 'windows-1252' | 'utf-16'} encoding
 * @property {'en' | 'de'} locale of its dates
 */

/** The bores of the engine in their order along the cam, front first. */
const ORDER = [1, 3, 5, 7, 2, 4, 6, 8].flatMap((cylinder) =>
  [1, 4, 5, 8].includes(cylinder)
    ? [`${cylinder} exhaust`, `${cylinder} intake`]
    : [`${cylinder} intake`, `${cylinder} exhaust`],
);

const CYLINDERS = [1, 2, 3, 4, 5, 6, 7, 8];
const LIFTER = 'lifter-body-diameter';
const BORE = 'tappet-bore-diameter';

/** Tenths of a thousandth of an inch, so that every sum is one of whole numbers. @param {string} place */
const lifterTenths = (place) => 8422 + (ORDER.indexOf(place) % 3);
/** @param {string} place */
const clearanceTenths = (place) => 15 + (ORDER.indexOf(place) % 4);
/** @param {string} place */
const boreTenths = (place) => lifterTenths(place) + clearanceTenths(place);
/** @param {number} tenths */
const inches = (tenths) => (tenths / 10_000).toFixed(4);
/** @param {number} tenths @param {number} [places] */
const millimetres = (tenths, places = 3) => ((tenths * 254) / 100_000).toFixed(places);

/** @param {string} value @param {number} [span] @returns {Cell} */
const text = (value, span) => ({ kind: 'text', value, ...(span === undefined ? {} : { span }) });
/** @param {string} value @param {string} [style] @returns {Cell} */
const number = (value, style) => ({
  kind: 'number',
  value,
  ...(style === undefined ? {} : { style }),
});
/** @param {Cell} cell @param {string} position @param {string} quantity @param {string} value @returns {Cell} */
const reads = (cell, position, quantity, value) => ({
  ...cell,
  reading: { position, quantity, value },
});
/** @param {Cell} cell @param {string} position @param {string} quantity @param {string} detail @returns {Cell} */
const asked = (cell, position, quantity, detail) => ({
  ...cell,
  reading: { position, quantity, detail },
});

/** @param {string} place @param {string} [style] */
const lifter = (place, style = 'places4') => {
  const value = inches(lifterTenths(place));
  return reads(number(value, style), place, LIFTER, `${value} in`);
};
/** @param {string} place @param {string} [style] */
const bore = (place, style = 'places4') => {
  const value = inches(boreTenths(place));
  return reads(number(value, style), place, BORE, `${value} in`);
};
/** @param {string} place @param {'lifter' | 'bore'} what @param {string} [style] */
const metric = (place, what, style = 'places3') => {
  const value = millimetres(what === 'lifter' ? lifterTenths(place) : boreTenths(place));
  return reads(number(value, style), place, what === 'lifter' ? LIFTER : BORE, `${value} mm`);
};

/** @type {Csv} */
const ENGLISH = { suffix: '', delimiter: ',', encoding: 'utf-8', locale: 'en' };
/** @type {Csv} */
const GERMAN = { suffix: '', delimiter: ';', encoding: 'windows-1252', locale: 'de' };

/** @param {string} place */
const short = (place) => place.replace(' intake', 'I').replace(' exhaust', 'E');

/** @type {readonly Shape[]} */
export const SHAPES = [
  {
    name: 'german',
    what: 'German locale: decimal commas, semicolons, the code page of the West, headings nobody knows here',
    sheets: [
      {
        name: 'Stößel',
        rows: [
          [text('Position'), text('Stößel Ø [mm]'), text('Führung Ø [mm]'), text('Prüfer')],
          ...ORDER.map((place) => [
            text(place.replace('intake', 'Einlass').replace('exhaust', 'Auslass')),
            metric(place, 'lifter'),
            metric(place, 'bore'),
            text('Jörg'),
          ]),
        ],
      },
    ],
    locale: 'de',
    csv: [GERMAN],
    columns: {
      'Stößel Ø [mm]': { quantity: LIFTER, unit: 'mm' },
      'Führung Ø [mm]': { quantity: BORE, unit: 'mm' },
      Prüfer: { quantity: '', unit: '' },
    },
  },
  {
    name: 'merged-titles',
    what: 'title rows merged over the table, headings of two rows, one row a cylinder',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Lifter bores, engine VR-2231', 5)],
          [text('Measured by', 2), text('J. Marsh', 3)],
          [],
          [null, text('Intake', 2), text('Exhaust', 2)],
          [text('Cyl.'), text('lifter'), text('bore'), text('lifter'), text('bore')],
          ...CYLINDERS.map((cylinder) => [
            number(String(cylinder)),
            lifter(`${cylinder} intake`),
            bore(`${cylinder} intake`),
            lifter(`${cylinder} exhaust`),
            bore(`${cylinder} exhaust`),
          ]),
        ],
      },
    ],
    csv: [ENGLISH],
  },
  {
    name: 'formulas',
    what: 'bores worked out by formulas, one of them failing, and an average below',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Position'), text('Lifter (in)'), text('Clearance'), text('Bore (in)')],
          ...ORDER.map((place, at) => {
            const row = at + 2;
            const formula = place === '6 exhaust' ? `[.B${row}]/0` : `[.B${row}]+[.C${row}]`;
            /** @type {Cell} */
            const cell = { kind: 'formula', value: formula, style: 'places4' };
            return [
              text(place),
              lifter(place),
              number(inches(clearanceTenths(place)), 'places4'),
              place === '6 exhaust'
                ? asked(cell, place, BORE, '“#DIV/0!” is no number')
                : reads(cell, place, BORE, `${inches(boreTenths(place))} in`),
            ];
          }),
          [
            text('Average'),
            { kind: 'formula', value: 'AVERAGE([.B2:.B17])', style: 'places4' },
            null,
            null,
          ],
        ],
      },
    ],
    csv: [ENGLISH],
    columns: { Clearance: { quantity: '', unit: '' } },
    notes: ['Row 18'],
  },
  {
    name: 'units-in-cells',
    what: 'units behind the numbers, typed in some cells and in the format of others',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('No'), text('Lifter'), text('Bore')],
          ...ORDER.map((place, at) => {
            const value = inches(lifterTenths(place));
            return [
              text(short(place)),
              at % 2 === 0
                ? reads(text(`${value} in`), place, LIFTER, `${value} in`)
                : lifter(place, 'inch4'),
              metric(place, 'bore', 'mm3'),
            ];
          }),
        ],
      },
    ],
    csv: [ENGLISH],
  },
  {
    name: 'across',
    what: 'bores side by side along the first row, readings below each other',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Bore no'), ...ORDER.map((place) => text(short(place)))],
          [text('Lifter body'), ...ORDER.map((place) => lifter(place))],
          [text('Tappet bore'), ...ORDER.map((place) => bore(place))],
        ],
      },
    ],
    csv: [ENGLISH],
  },
  {
    name: 'blanks',
    what: 'blank rows and columns, places from the back, remarks beside them, a bore left out',
    sheets: [
      {
        name: 'Sheet1',
        formattedToTheEnd: true,
        rows: [
          [],
          [null, text('Where'), null, text('Bore'), text('Lifter'), null, text('Remarks')],
          [],
          ...[...ORDER]
            .reverse()
            .flatMap((place, at) => [
              [
                null,
                text(place),
                null,
                place === '2 intake' ? null : bore(place),
                lifter(place),
                null,
                at === 3 ? text('honed; "B" ring, see photo') : null,
              ],
              ...(at % 4 === 3 ? [[]] : []),
            ]),
        ],
      },
    ],
    csv: [ENGLISH],
    columns: { Remarks: { quantity: '', unit: '' } },
  },
  {
    name: 'dates',
    what: 'a value that the spreadsheet took for a day, and the day of measuring above',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Measured on'), { kind: 'date', value: '2026-05-02', style: 'day' }],
          [text('Position'), text('Lifter'), text('Bore')],
          ...ORDER.map((place) => [
            text(place),
            lifter(place),
            place === '3 intake'
              ? asked({ kind: 'date', value: '2026-04-08', style: 'day' }, place, BORE, 'is a date')
              : bore(place),
          ]),
        ],
      },
    ],
    csv: [ENGLISH],
  },
  {
    name: 'two-sheets',
    what: 'notes on the first sheet, the lifters on the second, last year’s on a hidden third',
    sheets: [
      { name: 'Notes', rows: [[text('Block honed in March.')], [text('Ask Jo about no. 3.')]] },
      {
        name: 'Lifters',
        rows: [
          [text('Position'), text('Lifter'), text('Bore')],
          ...ORDER.map((place) => [text(place), lifter(place), bore(place)]),
        ],
      },
      {
        name: 'Old',
        hidden: true,
        rows: [
          [text('Position'), text('Lifter'), text('Bore')],
          ...ORDER.map((place) => [text(place), number('0.8411'), number('0.8433')]),
        ],
      },
    ],
    read: 1,
    csv: [],
  },
  {
    name: 'hidden',
    what: 'a hidden column of earlier readings, and rows that a filter hides',
    sheets: [
      {
        name: 'Sheet1',
        hiddenColumns: [1],
        hiddenRows: [1, 2],
        rows: [
          [text('Position'), text('Lifter before'), text('Lifter'), text('Bore')],
          ...ORDER.map((place, at) => [
            text(place),
            number('0.8419', 'places4'),
            ...(at < 2
              ? [number('0.8422', 'places4'), number('0.8440', 'places4')]
              : [lifter(place), bore(place)]),
          ]),
        ],
      },
    ],
    csv: [],
    notes: ['Row 2, Row 3', 'Column B'],
  },
  {
    name: 'text-numbers',
    what: 'numbers kept as text, with spaces and narrow no-break spaces about them',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('POS.'), text('LIFTER OD, IN'), text('BORE ID, IN')],
          ...ORDER.map((place, at) => {
            const [body, hole] = [inches(lifterTenths(place)), inches(boreTenths(place))];
            return [
              text(` ${place.toUpperCase()} `),
              reads(text(at % 2 === 0 ? ` ${body}` : `${body}\u00a0`), place, LIFTER, `${body} in`),
              place === '7 exhaust'
                ? asked(text('0.84.39'), place, BORE, '“0.84.39” is no number')
                : reads(text(hole.replace(/^0/, '')), place, BORE, `${hole} in`),
            ];
          }),
        ],
      },
    ],
    csv: [ENGLISH],
  },
  {
    name: 'formats',
    what: 'scientific numbers, thousands set apart, percentages beside them',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Position'), text('Lifter (in)'), text('Bore (µm)'), text('Worn')],
          ...ORDER.map((place, at) => {
            const micrometres = ((boreTenths(place) * 254) / 100).toFixed(1);
            return [
              text(place),
              lifter(place, 'scientific'),
              reads(number(micrometres, 'grouped1'), place, BORE, `${micrometres} µm`),
              number((at / 400).toFixed(4), 'percent'),
            ];
          }),
        ],
      },
    ],
    csv: [ENGLISH],
    columns: { Worn: { quantity: '', unit: '' } },
  },
  {
    name: 'other-order',
    what: 'columns in another order, cylinder and valve apart, millimetres with a comma, as tabbed UTF-16',
    sheets: [
      {
        name: 'Sheet1',
        rows: [
          [text('Bore mm'), text('Lifter mm'), text('Valve'), text('Cyl')],
          ...ORDER.map((place) => {
            const [cylinder = '', valve = ''] = place.split(' ');
            return [
              metric(place, 'bore'),
              metric(place, 'lifter'),
              text(valve === 'intake' ? 'Inl' : 'Exh'),
              number(cylinder),
            ];
          }),
        ],
      },
    ],
    locale: 'de',
    csv: [
      { suffix: '-utf16', delimiter: '\t', encoding: 'utf-16', locale: 'de' },
      { suffix: '-de', delimiter: ';', encoding: 'utf-8', locale: 'de' },
    ],
  },
];

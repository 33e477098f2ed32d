import { type Field, type FieldGroup, lengthUnit, type Typed, volumeUnit } from '../fields';
import { chosen } from '../typed';

const part = (name: string, label: string, hint?: string): Field => ({
  name,
  label,
  kind: 'number',
  pointer: `/inputs/${name}`,
  ...(hint !== undefined && { hint }),
});

export const compressionForm: readonly FieldGroup[] = [
  {
    legend: 'Cylinder',
    fields: [
      lengthUnit('lengthUnit', '/inputs/lengthUnit'),
      part('bore', 'Bore'),
      part('stroke', 'Stroke'),
      part('deck', 'Deck clearance', 'Piston below the deck plus, above it minus.'),
    ],
  },
  {
    legend: 'Chamber',
    fields: [
      volumeUnit('volumeUnit', '/inputs/volumeUnit'),
      part('chamber', 'Chamber volume', 'As poured through a plate.'),
      part('piston', 'Piston', 'Dish and valve pockets plus, dome minus.'),
    ],
  },
  {
    legend: 'Gasket',
    fields: [
      part('gasketBore', 'Gasket bore'),
      part('gasketThickness', 'Gasket thickness', 'As compressed.'),
    ],
  },
];

const NAMES = ['bore', 'stroke', 'deck', 'chamber', 'piston', 'gasketBore', 'gasketThickness'];

export const compressionBody = (typed: Typed): unknown => ({
  quantity: 'compression-ratio',
  inputs: {
    lengthUnit: chosen(compressionForm, typed, 'lengthUnit'),
    volumeUnit: chosen(compressionForm, typed, 'volumeUnit'),
    ...Object.fromEntries(NAMES.map((name) => [name, typed[name]])),
  },
});

export const compressionExample =
  '?lengthUnit=in&bore=4.030&stroke=3.480&deck=0.025&volumeUnit=cc&chamber=64&piston=6&gasketBore=4.100&gasketThickness=0.039';

import type { Step } from './plan';

export type View = 'front-up' | 'front-left' | 'mini';

/** Distances in px of one view; `across` values count outward from the cam line. */
export interface Frame {
  readonly width: number;
  readonly height: number;
  /** Where the cam line lies across the view. */
  readonly cam: number;
  /** Where the rows start along the cam, and how long they are. */
  readonly start: number;
  readonly length: number;
  readonly row: number;
  readonly radius: number;
  readonly letter: number;
  readonly value: number;
  readonly arc: number;
  readonly arcRadius: number;
  readonly number: number;
  /** Outer edge of a bore's row: its touch target ends there. */
  readonly edge: number;
  readonly fonts: {
    readonly value: number;
    readonly letter: number;
    readonly number: number;
  };
}

export const frames: Readonly<Record<View, Frame>> = {
  'front-up': {
    width: 412,
    height: 598,
    cam: 205,
    start: 31,
    length: 562,
    row: 62,
    radius: 23,
    letter: 23,
    value: 98,
    arc: 206,
    arcRadius: 58,
    number: 180,
    edge: 146,
    fonts: { value: 24, letter: 18, number: 24 },
  },
  'front-left': {
    width: 820,
    height: 332,
    cam: 165,
    start: 30,
    length: 766,
    row: 53,
    radius: 23,
    letter: 18,
    value: 92,
    arc: 213,
    arcRadius: 88,
    number: 147,
    edge: 114,
    fonts: { value: 24, letter: 18, number: 24 },
  },
  mini: {
    width: 346,
    height: 142,
    cam: 71,
    start: 1,
    length: 344,
    row: 33,
    radius: 12,
    letter: 11.5,
    value: 0,
    arc: 84,
    arcRadius: 34,
    number: 60,
    edge: 49,
    fonts: { value: 0, letter: 16, number: 16 },
  },
};

export interface Point {
  readonly x: number;
  readonly y: number;
}

const round = (n: number) => Math.round(n * 100) / 100;

/**
 * A place on the engine as a place in the view. Front up: `u` runs down, `v` to the right. Front to
 * the left: the same drawing after a quarter turn to the left, so the right bank comes to lie on top.
 * Neither is a mirror.
 */
export const project = (frame: Frame, view: View, u: number, v: number): Point =>
  view === 'front-up'
    ? { x: round(frame.cam + v), y: round(frame.start + u) }
    : { x: round(frame.start + u), y: round(frame.cam - v) };

/** A box along and across the engine, as x, y, width, height. */
export const projectBox = (
  frame: Frame,
  view: View,
  [u0, u1]: readonly [number, number],
  [v0, v1]: readonly [number, number],
) => {
  const a = project(frame, view, u0, v0);
  const b = project(frame, view, u1, v1);
  return {
    x: Math.min(a.x, b.x),
    y: Math.min(a.y, b.y),
    width: round(Math.abs(a.x - b.x)),
    height: round(Math.abs(a.y - b.y)),
  };
};

const arrows: Readonly<Record<'up' | 'turned', Readonly<Record<string, Step>>>> = {
  up: { ArrowUp: 'forward', ArrowDown: 'back', ArrowLeft: 'left', ArrowRight: 'right' },
  turned: { ArrowLeft: 'forward', ArrowRight: 'back', ArrowDown: 'left', ArrowUp: 'right' },
};

/** Which way on the engine an arrow key leads in this view. */
export const stepOfKey = (view: View, key: string): Step | undefined =>
  arrows[view === 'front-up' ? 'up' : 'turned'][key];

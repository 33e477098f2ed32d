import { describe, expect, it } from 'vitest';
import type { Helping } from '@/domain/access/helping';
import { openings, rightsOn } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';

const actor = (helping: readonly Helping[] = []): Actor => ({
  personId: 'me',
  name: 'Edda Sorrel',
  sessionId: 's',
  authenticatedAt: '2026-07-11T20:00:00.000Z',
  siteAdmin: false,
  standings: [{ seriesId: 'A', role: 'competitor' }],
  helping,
});

const help = (change: Partial<Helping>): Helping => ({
  as: 'builder',
  competitorId: 'customer',
  competitorName: '',
  seriesIds: ['A'],
  rights: ['sheets'],
  ...change,
});

const paper = (change = {}) => ({
  competitorId: 'customer',
  seriesId: 'A',
  engineId: 'e1',
  ...change,
});

describe('rights on paperwork', () => {
  it('are all of them on one’s own, in series where one may hand in', () => {
    expect(rightsOn(actor(), paper({ competitorId: 'me' }))).toEqual([
      'see',
      'sheets',
      'answers',
      'hand-in',
      'verdicts',
    ]);
    expect(rightsOn(actor(), paper({ competitorId: 'me', seriesId: 'B' }))).toEqual([]);
  });

  it('are a customer’s as granted: engine, series and right each count', () => {
    const mine = actor([help({ engineIds: ['e1'] })]);
    expect(rightsOn(mine, paper())).toEqual(['see', 'sheets']);
    expect(rightsOn(mine, paper({ engineId: 'e2' }))).toEqual([]);
    expect(rightsOn(mine, paper({ seriesId: 'B' }))).toEqual([]);
    expect(rightsOn(mine, paper({ competitorId: 'another' }))).toEqual([]);
  });

  it('to verdicts alone show no paperwork', () => {
    expect(rightsOn(actor([help({ rights: ['verdicts'] })]), paper())).toEqual(['verdicts']);
  });

  it('of two grants add up on the engine that both name, and nowhere else', () => {
    const mine = actor([
      help({ engineIds: ['e1'] }),
      help({ rights: ['hand-in'], engineIds: ['e1', 'e2'] }),
    ]);
    expect(rightsOn(mine, paper())).toEqual(['see', 'sheets', 'hand-in']);
    expect(rightsOn(mine, paper({ engineId: 'e2' }))).toEqual(['see', 'hand-in']);
    expect(openings(mine, 'answers')).toHaveLength(1);
  });
});

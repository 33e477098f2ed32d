import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { keepFile } from '@/services/file/keep-file';
import { handedIn, openPaddock, type Paddock, picture } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';

let world: World;
let paddock: Paddock;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

describe('the bytes of a file', () => {
  it('of which nothing is kept are not left in the store, where no row names them', async () => {
    const { paperworkId } = await handedIn(paddock);
    const bytes = await picture(333);
    const late = await keepFile(paddock.ports(), paddock.competitor, {
      act: paddock.uuid(),
      fileId: paddock.uuid(),
      paperworkId,
      purpose: 'photograph',
      item: 'lifters-racked',
      name: 'late.jpg',
      declaredType: 'image/jpeg',
      declaredBytes: bytes.length,
      bytes,
    });
    expect(late).toMatchObject({ failure: { name: 'not-in-this-state' } });
    expect(paddock.objects.stored.has(`originals/${toHex(sha256(bytes))}`)).toBe(false);
  });
});

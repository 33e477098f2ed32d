import { swapRequest } from '@/contracts/engine/swap';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { swapEngine } from '@/services/engine/swap/swap-engine';

export const POST = write(swapRequest, async ({ ports, actor, body }) =>
  actor === null ? fail(signInFirst()) : swapEngine(ports, actor, body),
);

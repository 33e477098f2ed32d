import { createServer } from 'node:http';
import { openDatabase } from '@/adapters/database/orm';
import { openJobs } from '@/adapters/jobs';
import { systemClock, systemRandom } from '@/adapters/system/system';
import { capturesRequest } from '@/contracts/inspection/captures';
import type { Actor } from '@/domain/access/permission';
import { recordCaptures } from '@/services/inspection/capture/record-captures';

/**
 * The captures endpoint alone, over the product's own contract, use case and database access, in a
 * process that a test may kill at any instant. Who asks stands in the environment.
 */
const url = process.env['DATABASE_URL'] ?? '';
const actor = JSON.parse(process.env['ACTOR'] ?? '') as Actor;
const orm = await openDatabase(url);
const { jobs } = await openJobs(url, () => undefined);

const server = createServer((request, response) => {
  const parts: Buffer[] = [];
  request.on('data', (part: Buffer) => parts.push(part));
  request.on('end', async () => {
    const inspectionId = request.url?.slice(1) ?? '';
    const body = capturesRequest.parse(JSON.parse(Buffer.concat(parts).toString()));
    const deps = { db: orm.em.fork(), clock: systemClock, random: systemRandom, jobs };
    const result = await recordCaptures(deps, actor, { ...body, inspectionId });
    response.writeHead(result.ok ? 200 : 422, { 'content-type': 'application/json' });
    response.end(JSON.stringify(result.ok ? result.value : result.failure));
  });
});
server.listen(Number(process.env['PORT'] ?? 0), '127.0.0.1', () => {
  const address = server.address();
  if (address !== null && typeof address === 'object') process.send?.({ port: address.port });
});

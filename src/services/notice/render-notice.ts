import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { ok } from '@/domain/result';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { actIdFor } from './act-id';
import { findNoticeLine, type NoticeProof, noticeAttachment } from './notice-file';
import { noticeMail } from './notice-mail';

type Deps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'site' | 'notices'>;

interface VerdictRow {
  readonly act: string;
  readonly notice: string;
  readonly printed: boolean;
  readonly personId: string | null;
  readonly email: string | null;
}

const findVerdict = async (em: EntityManager, seriesId: string, verdictId: string) => {
  const [row] = await em.execute<VerdictRow[]>(
    `select v.act_id as act, v.notice, n.verdict_id is not null as printed,
            p.id as "personId", p.email
     from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     left join public.person p on p.id = e.competitor_id
     left join record.notice_pdf n on n.series_id = v.series_id and n.verdict_id = v.id
     where v.series_id = ? and v.id = ?`,
    [seriesId, verdictId],
  );
  return row;
};

/** Where the print's code leads: the page that checks the notice and shows it. */
const verifyPath = ({ series, number }: Pick<NoticeDocument, 'series' | 'number'>): string =>
  `/verify?${new URLSearchParams({ series: series.slug, number })}`;

/**
 * Prints a published notice, keeps the PDF by its hash, records that hash in a ledger line and
 * queues the competitor's e-mail with the PDF. Done once, however often the job comes back.
 * `findProof` gives the line's proof once a signed head covers it.
 */
export const renderNotice = async (
  deps: Deps,
  { seriesId, verdictId }: { readonly seriesId: string; readonly verdictId: string },
  findProof: (line: number) => Promise<NoticeProof | undefined> = async () => undefined,
): Promise<void> => {
  const row = await findVerdict(deps.db, seriesId, verdictId);
  if (row === undefined) throw new Error(`There is no verdict ${verdictId}.`);
  if (row.printed) return;
  const line = await findNoticeLine(deps.db, seriesId, row.act);
  if (line === undefined) throw new Error(`Verdict ${verdictId} has no ledger line.`);
  const proven = await findProof(line.index);
  const notice = JSON.parse(row.notice) as NoticeDocument;
  const pdf = await deps.notices.print({
    notice,
    ledger: { line: line.index, checkpoint: proven?.checkpoint },
    url: `${deps.site.publicUrl}${verifyPath(notice)}`,
    attachment: noticeAttachment(row.notice, line, proven),
  });
  const hash = sha256(pdf);
  const receipt = proven && {
    line: line.index,
    sha256: toHex(sha256(utf8(row.notice))),
    head: proven.proof.checkpoint,
  };
  const objectKey = `notices/${toHex(hash)}.pdf`;
  await deps.objects.write(objectKey, pdf, 'application/pdf');
  const id = actIdFor('render-notice', verdictId);
  const done = await performAct(
    deps,
    null,
    { id, kind: 'render-notice', seriesId, input: { verdictId } },
    async ({ em, at, append, line: write, send }) => {
      append('notice_pdf', [
        {
          series_id: seriesId,
          verdict_id: verdictId,
          sha256: hash,
          bytes: pdf.length,
          object_key: objectKey,
        },
      ]);
      if (row.email !== null) {
        const to = { seriesId, personId: row.personId, address: row.email };
        queueMail(deps, em, { send, at }, { ...to, ...noticeMail(notice, objectKey, receipt) });
      }
      write({
        seriesId,
        kind: 'notice-pdf',
        contents: { pdf: { sha256: hash, open: true } },
        refs: { notice: String(line.index) },
      });
      return ok({ objectKey });
    },
  );
  if (!done.ok) throw new Error(done.failure.detail);
};

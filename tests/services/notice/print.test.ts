import { describe, expect, it } from 'vitest';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import type { NoticeToPrint } from '@/services/ports';
import { noticeOf } from '../../domain/verdict/parts';
import { readPdf } from '../../support/pdf-text';

const sheet = (more: Partial<NoticeToPrint> = {}): NoticeToPrint => ({
  notice: noticeOf(),
  ledger: { line: 1284 },
  url: 'https://records.example/series/corran-valley/verdicts/2026-041',
  attachment: { name: 'notice.json', text: '{"a":"1"}' },
  ...more,
});

describe('the printed notice', () => {
  it('is the same bytes for the same notice, and others for any change', async () => {
    const first = await noticePrinter.print(sheet());
    expect(Buffer.from(await noticePrinter.print(sheet())).equals(Buffer.from(first))).toBe(true);
    const other = await noticePrinter.print(sheet({ ledger: { line: 1285 } }));
    expect(Buffer.from(other).equals(Buffer.from(first))).toBe(false);
  });

  it('runs over as many pages as it needs, each with its number and the rules’ hash', async () => {
    const notice = { ...noticeOf(), reasons: 'A long reason in many words. '.repeat(400) };
    const pdf = readPdf(await noticePrinter.print(sheet({ notice })));
    expect(pdf.pages).toBeGreaterThan(2);
    for (let page = 1; page <= pdf.pages; page += 1) {
      expect(pdf.text).toContain(`${page} of ${pdf.pages}`);
    }
    expect(pdf.text.match(/3e9a 51c7/g)).toHaveLength(pdf.pages);
    expect(pdf.text.replaceAll(/\s+/g, ' ').match(/A long reason in many words\./g)).toHaveLength(
      400,
    );
  });

  it.each([
    ['Дарья Řezníková', 'Darya Řezníková'],
    ['Ґалина Їжак', 'Galyna Jizhak'],
    ['Ὀρέστης Ξανθόπουλος', 'Orestis Xanthopoulos'],
    ['Nguyễn Thị Ửng', 'Nguyen Thi Ung'],
  ])('prints %s as it is written, beside the Latin form', async (name, latinName) => {
    const notice = noticeOf({ decidedBy: { name, latinName } });
    const pdf = await noticePrinter.print(sheet({ notice }));
    expect(readPdf(pdf).text.normalize('NFC')).toContain(`${name} (${latinName}), series official`);
    const again = await noticePrinter.print(sheet({ notice }));
    expect(Buffer.from(again).equals(Buffer.from(pdf))).toBe(true);
  });

  it('prints the Latin form of a name in any other script, and the name’s boxes where none was given', async () => {
    const printed = async (decidedBy: { name: string; latinName?: string }) =>
      readPdf(await noticePrinter.print(sheet({ notice: noticeOf({ decidedBy }) }))).text;
    const latin = await printed({ name: '藤原 美雪', latinName: 'Miyuki Fujiwara' });
    expect(latin).toContain('Miyuki Fujiwara, series official');
    expect(latin).not.toContain('¤');
    expect(await printed({ name: '藤原 美雪' })).toContain('¤¤ ¤¤, series official');
  });

  it('carries the wide faces only where a letter asks for them', async () => {
    const fonts = async (name: string) => {
      const pdf = await noticePrinter.print(sheet({ notice: noticeOf({ decidedBy: { name } }) }));
      return Buffer.from(pdf).toString('latin1').includes('NotoSans');
    };
    expect(await fonts('Ilse Törnkvist')).toBe(false);
    expect(await fonts('Дарья Řezníková')).toBe(true);
  });

  it('breaks a word that is wider than its column', async () => {
    const notice = { ...noticeOf(), reasons: 'x'.repeat(500) };
    const pdf = readPdf(await noticePrinter.print(sheet({ notice })));
    expect(pdf.text.replaceAll('\n', '')).toContain('x'.repeat(500));
  });
});

import type { NewMail } from './queue-mail';

const escapeHtml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');

/** The same words as plain text and as HTML, with one link straight to what is to be done. */
export const renderMail = (
  publicUrl: string,
  mail: Pick<NewMail, 'paragraphs' | 'link'>,
): { readonly text: string; readonly html: string } => {
  const url = `${publicUrl}${mail.link.path}`;
  const text = [...mail.paragraphs, `${mail.link.label}: ${url}`, 'Tagwire'].join('\n\n');
  const html = [
    '<!doctype html><html lang="en"><body style="font:18px/1.5 sans-serif;color:#12202B">',
    ...mail.paragraphs.map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
    `<p><a href="${escapeHtml(url)}" style="color:#1B3A8C;font-weight:bold">${escapeHtml(mail.link.label)}</a></p>`,
    '<p>Tagwire</p></body></html>',
  ].join('\n');
  return { text: `${text}\n`, html };
};

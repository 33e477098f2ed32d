import type { NewMail } from './queue-mail';

const escapeHtml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');

const LINK = 'color:#1B3A8C;font-weight:bold';
const BUTTON =
  'display:inline-block;padding:14px 20px;background:#1B3A8C;color:#FFFFFF;font-weight:bold;text-decoration:none';

export interface RenderedMail {
  readonly text: string;
  readonly html: string;
}

/** What stands below, in small: why it came, and how to have no more of it where that is possible. */
const footOf = (publicUrl: string, off: MailOff | undefined): readonly [string, string] => {
  if (off === undefined)
    return [
      'You get this message because you take part. Messages of this kind cannot be turned off.',
      `${publicUrl}/paddock/mail`,
    ];
  return [`You get this message because you take part. To get none about “${off.title}”:`, off.url];
};

export interface MailOff {
  readonly title: string;
  readonly url: string;
}

/** The same words as plain text and as HTML: what happened, what to do next, one link straight there. */
export const renderMail = (
  publicUrl: string,
  mail: Pick<NewMail, 'subject' | 'paragraphs' | 'next' | 'link'>,
  off?: MailOff | undefined,
): RenderedMail => {
  const { subject, paragraphs, next, link } = mail;
  const url = `${publicUrl}${link.path}`;
  const all = next === undefined ? paragraphs : [...paragraphs, `Next: ${next}`];
  const [foot, footUrl] = footOf(publicUrl, off);
  const text = [...all, `${link.label}: ${url}`, `-- \nTagwire\n${foot}\n${footUrl}`].join('\n\n');
  const html = [
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(subject)}</title></head>`,
    '<body style="margin:0;padding:20px;font:18px/1.5 sans-serif;color:#12202B;background:#FBFBF7">',
    ...paragraphs.map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
    ...(next === undefined ? [] : [`<p><b>Next:</b> ${escapeHtml(next)}</p>`]),
    `<p><a href="${escapeHtml(url)}" style="${BUTTON}">${escapeHtml(link.label)}</a></p>`,
    `<p style="font-size:16px;color:#44525C">Tagwire<br>${escapeHtml(foot)}<br><a href="${escapeHtml(footUrl)}" style="${LINK}">${off === undefined ? 'Which messages you get' : 'Turn these off'}</a></p>`,
    '</body></html>',
  ].join('\n');
  return { text: `${text}\n`, html };
};

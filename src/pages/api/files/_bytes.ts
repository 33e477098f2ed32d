import type { OpenedFile } from '@/services/file/open-file';

/** Names may hold anything; a header may not (RFC 6266, RFC 8187). */
const disposition = (kind: 'inline' | 'attachment', name: string): string => {
  const plain = name.replace(/[^\w.\- ]/g, '_').slice(0, 100) || 'file';
  return `${kind}; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(name)}`;
};

/** Bytes of a private file: never guessed at, never framed, never kept by a shared cache. */
export const bytesResponse = (file: OpenedFile, kind: 'inline' | 'attachment'): Response =>
  new Response(Buffer.from(file.bytes), {
    headers: {
      'content-type': file.type,
      'content-length': String(file.bytes.length),
      'content-disposition': disposition(kind, file.name),
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
      'cache-control': kind === 'inline' ? 'private, max-age=3600' : 'private, no-store',
    },
  });

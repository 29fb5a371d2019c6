/** A text in the way of RFC 8187: of what `encodeURIComponent` leaves as it is, these four do not belong there. */
function encoded(text: string): string {
  return encodeURIComponent(text).replaceAll(/['()*]/gu, (one) => `%${one.charCodeAt(0).toString(16).toUpperCase()}`);
}

/** A file to be saved, never shown: whatever it holds, no browser runs it. */
export function attachment(bytes: Uint8Array, name: string, type: string): Response {
  // RFC 6266: a plain name for old clients, the exact one encoded.
  const plain = name.replaceAll(/[^\w.-]+/g, '_') || 'file';
  return new Response(new Uint8Array(bytes), {
    headers: {
      'content-type': type,
      'content-disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encoded(name)}`,
      'x-content-type-options': 'nosniff',
      'cache-control': 'no-store',
    },
  });
}

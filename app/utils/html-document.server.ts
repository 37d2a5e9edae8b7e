/** A page that we wrote for paper: its own styles, no script, nothing from elsewhere, and no origin of ours. */
export function htmlDocument(html: string | Uint8Array): Response {
  return new Response(html as BodyInit, {
    headers: {
      "content-type": "text/html; charset=utf-8",
      "cache-control": "no-store",
      "content-security-policy": "default-src 'none'; style-src 'unsafe-inline'; sandbox allow-popups; base-uri 'none'; form-action 'none'",
      "x-content-type-options": "nosniff",
    },
  });
}

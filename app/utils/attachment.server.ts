/** An answer that a browser saves and never shows: what others wrote must not run under our address. */
export function toAttachment(content: Uint8Array | string, fileName: string, type: string): Response {
  const plain = fileName.replace(/[^\w.\- ]+/g, "_");
  const body = typeof content === "string" ? content : (content as Uint8Array<ArrayBuffer>);
  return new Response(body, {
    headers: {
      "content-type": type,
      "content-disposition": `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(fileName)}`,
      "cache-control": "private, no-cache",
      "x-content-type-options": "nosniff",
    },
  });
}

/** Text up to the first zero octet. Octets that are no UTF-8 become U+FFFD. */
export function readText(octets: Uint8Array): string {
  const end = octets.indexOf(0);
  const shown = end < 0 ? octets : octets.subarray(0, end);
  let encoded = "";
  for (const octet of shown) encoded += `%${octet.toString(16).padStart(2, "0")}`;
  try {
    return decodeURIComponent(encoded);
  } catch {
    return Array.from(shown, (octet) => (octet < 128 ? String.fromCharCode(octet) : "\ufffd")).join("");
  }
}

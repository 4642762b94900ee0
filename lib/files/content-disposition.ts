const UNSAFE = /[\p{Cc}\p{Cf}\p{Cs}\u2028\u2029\\/:*?"<>|]/gu;
const LONGEST = 120;
/** Stays whatever is cut before it: by it a machine knows what to open the file with. */
const ENDING = /\.[a-z0-9]{1,8}$/i;

/**
 * Offers a download under a name (RFC 6266): once in ASCII for old readers and, where that loses something, once in UTF-8
 * (RFC 8187). Path signs and control characters never pass.
 */
export function contentDisposition(name: string): string {
  const whole = name.normalize("NFC").replace(UNSAFE, "-");
  const [ending] = ENDING.exec(whole) ?? [""];
  const stem = [...whole.slice(0, whole.length - ending.length)].slice(0, LONGEST - ending.length).join("");
  const safe = `${stem.replace(/^[.\s]+/, "").trimEnd() || "file"}${ending}`;
  const ascii = safe.replace(/[^\x20-\x7e]/g, "-").replace(/%/g, "-");
  if (ascii === safe) return `attachment; filename="${ascii}"`;
  return `attachment; filename="${ascii}"; filename*=UTF-8''${percentEncoded(safe)}`;
}

/** `encodeURIComponent` leaves ' ( ) * which RFC 8187 does not allow. */
function percentEncoded(text: string): string {
  return encodeURIComponent(text).replace(/['()*]/g, (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`);
}

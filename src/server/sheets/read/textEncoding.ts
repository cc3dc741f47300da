/** Which letters the bytes of a text file stand for: by its mark, by its form, by how many letters make sense. */

export interface DecodedText {
  readonly text: string;
  /** It had been saved in one encoding and labelled as another, and was put right. */
  readonly repaired: boolean;
  /** Letters that cannot be put right. */
  readonly damaged: boolean;
}

/** 'Ã¼' for 'ü', 'Ã©' for 'é', 'â‚¬' for '€': UTF-8 that was read as something else and saved again. */
const DOUBLED = /Ã[\u0080-\u00bf\u0152-\u02dc\u2013-\u203a\u20ac\u2122]|â‚¬|Â[\u00a0-\u00bf]/;

export function decodeText(bytes: Buffer): DecodedText {
  const text = new TextDecoder(encodingOf(bytes)).decode(bytes);
  const repaired = DOUBLED.test(text) ? undoubled(text) : null;
  if (repaired !== null) return { text: repaired, repaired: true, damaged: false };
  return { text, repaired: false, damaged: DOUBLED.test(text) || text.includes('\ufffd') };
}

function encodingOf(bytes: Buffer): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le';
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return 'utf-16be';
  const blind = blindUtf16(bytes);
  if (blind) return blind;
  if (decodes(bytes, 'utf-8')) return 'utf-8';
  return lettersIn(bytes, 'macintosh') > lettersIn(bytes, 'windows-1252') ? 'macintosh' : 'windows-1252';
}

/** Without a mark, every second byte of Latin text is zero. */
export function blindUtf16(bytes: Buffer): 'utf-16le' | 'utf-16be' | null {
  const sample = bytes.subarray(0, 4096);
  const zeros = [0, 0];
  sample.forEach((byte, at) => {
    if (byte === 0) zeros[at % 2] = (zeros[at % 2] ?? 0) + 1;
  });
  const half = sample.length / 2;
  const [even = 0, odd = 0] = zeros;
  if (odd > half * 0.8 && even < half * 0.1) return 'utf-16le';
  return even > half * 0.8 && odd < half * 0.1 ? 'utf-16be' : null;
}

function decodes(bytes: Buffer, encoding: string): boolean {
  try {
    new TextDecoder(encoding, { fatal: true }).decode(bytes);
    return true;
  } catch (error) {
    if (error instanceof TypeError) return false;
    throw error;
  }
}

/** Letters of western languages, less signs that no word holds. */
function lettersIn(bytes: Buffer, encoding: string): number {
  const text = new TextDecoder(encoding).decode(bytes);
  const count = (pattern: RegExp) => text.match(pattern)?.length ?? 0;
  return count(/[äöüßÄÖÜéèêàâçñáíóúîôûœ€£åÅøØ]/g) - count(/[‡†•ŠšŸŽžŒ‰¤¦ƒ¸¨ˆ˜]/g) * 2;
}

const HIGH_OF_1252 = new Map(
  Array.from({ length: 128 }, (_, at) => [
    new TextDecoder('windows-1252').decode(Uint8Array.of(128 + at)),
    128 + at,
  ]),
);

/** Null where the text is not wholly what such a mistake gives. */
function undoubled(text: string): string | null {
  const bytes: number[] = [];
  for (const letter of text) {
    const code = letter.codePointAt(0) ?? 0;
    const byte = code < 128 ? code : (HIGH_OF_1252.get(letter) ?? null);
    if (byte === null) return null;
    bytes.push(byte);
  }
  const whole = Uint8Array.from(bytes);
  return decodes(Buffer.from(whole), 'utf-8') ? new TextDecoder('utf-8').decode(whole) : null;
}

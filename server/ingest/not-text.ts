import { UserError } from '../shapes/problem';

const ZIP = [0x50, 0x4b, 0x03, 0x04];

/** First bytes of files that are brought by mistake, with what to do. Common signatures, no source. */
const signatures: { bytes: number[]; what: string; advice: string }[] = [
  { bytes: [0x1f, 0x8b], what: 'a compressed file (.gz)', advice: 'unpack it first' },
  {
    bytes: [0x25, 0x50, 0x44, 0x46],
    what: 'a PDF document',
    advice: "export the readings as CSV from the logger's program",
  },
  { bytes: [0x89, 0x50, 0x4e, 0x47], what: 'a picture (.png)', advice: "bring the logger's text file" },
  { bytes: [0xff, 0xd8, 0xff], what: 'a picture (.jpg)', advice: "bring the logger's text file" },
  { bytes: [0x47, 0x49, 0x46, 0x38], what: 'a picture (.gif)', advice: "bring the logger's text file" },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0],
    what: 'an old spreadsheet or document (.xls, .doc)',
    advice: 'save it as CSV first',
  },
  { bytes: [0x37, 0x7a, 0xbc, 0xaf], what: 'a compressed bundle (.7z)', advice: 'unpack it first' },
  { bytes: [0x52, 0x61, 0x72, 0x21], what: 'a compressed bundle (.rar)', advice: 'unpack it first' },
  { bytes: [...Buffer.from('SQLite format 3')], what: 'a database', advice: "bring the logger's text file" },
];

/** Refuses a file that is empty or is not text, by its first bytes. */
export function refuseUnlessText(head: Buffer, name: string, isUtf16: boolean): void {
  if (head.length === 0)
    throw new UserError(`${name} is empty (0 bytes). Download it from the logger again.`, 'cannot be read');
  const refuse = (what: string, advice: string): never => {
    throw new UserError(`${name} is ${what}, not the text of a logger: ${advice}. Nothing was read.`, 'cannot be read');
  };
  if (starts(head, ZIP)) {
    const isSheet = head.includes('[Content_Types].xml') || head.includes('xl/');
    refuse(isSheet ? 'a spreadsheet (.xlsx)' : 'a bundle (.zip)', isSheet ? 'save it as CSV first' : 'unpack it first');
  }
  for (const { bytes, what, advice } of signatures) if (starts(head, bytes)) refuse(what, advice);
  if (/^\s*<(!doctype|html|\?xml)/i.test(head.toString('latin1', 0, 200)))
    refuse('a web page or XML document', 'export the readings as CSV');
  if (!isUtf16 && controlShare(head) > 0.05)
    refuse('not text (too many of its bytes are no characters)', 'export the readings as CSV or text');
}

const starts = (head: Buffer, bytes: readonly number[]): boolean => bytes.every((byte, i) => head[i] === byte);

/** Share of control characters other than line ends, tabs and page feeds. Padding with NULs at the end is forgiven. */
function controlShare(head: Buffer): number {
  let end = head.length;
  while (end > 0 && head[end - 1] === 0) end--;
  if (end === 0) return 1;
  let controls = 0;
  for (let i = 0; i < end; i++) {
    const byte = head[i]!;
    if (byte < 9 || (byte > 13 && byte < 32 && byte !== 26 && byte !== 27)) controls++;
  }
  return controls / end;
}

import { CsvError, parse } from 'csv-parse/sync';
import { InvalidError } from './errors';

/* Uploaded tables: bytes to text to rows of cells. What a table may hold is its domain's business. */

/** The file as a whole can't be taken. */
export function fileFault(detail: string): InvalidError {
  return new InvalidError([{ pointer: '/file', detail }]);
}

/** UTF-8, with or without its mark, or UTF-16 with one; anything else is refused rather than read wrongly. */
export function decodeText(bytes: Uint8Array): string {
  if (bytes.length === 0) throw fileFault('The file is empty. Choose a CSV file.');
  const encoding =
    bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : 'utf-8';
  let text: string;
  try {
    text = new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch {
    throw fileFault('The file is not text in UTF-8. Save it as “CSV UTF-8” and choose it again.');
  }
  if (text.includes('\0')) throw fileFault('The file is not a text file. Save it as “CSV UTF-8” and choose it again.');
  return text;
}

const SEPARATORS = [',', ';', '\t'] as const;

/** Longer than any row of a table that this product takes; what exceeds it is a table of another kind. */
const MOST_CHARACTERS_IN_A_ROW = 100_000;

/**
 * The rows of a delimited text (RFC 4180, also with `;` or tab), the head first, each cell trimmed. The separator is the one
 * that the first line has most of. Ragged rows are left ragged, so that their fault can be told by row.
 */
export function readRecords(text: string, mostRecords: number): string[][] {
  const firstLine = text.slice(0, 10_000).split(/\r?\n|\r/, 1)[0]!;
  const counts = SEPARATORS.map((separator) => firstLine.split(separator).length);
  try {
    return parse(text, {
      delimiter: SEPARATORS[counts.indexOf(Math.max(...counts))]!,
      relax_column_count: true,
      skip_empty_lines: false,
      trim: true,
      max_record_size: MOST_CHARACTERS_IN_A_ROW,
      to: mostRecords,
    });
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const where = typeof error.lines === 'number' ? `Line ${error.lines}` : 'One line';
    const what =
      error.code === 'CSV_MAX_RECORD_SIZE'
        ? 'is far longer than a row of this table needs. Check its quotation marks'
        : 'has a quotation mark that opens or closes in the wrong place';
    throw fileFault(`${where} ${what}.`);
  }
}

import { decodeText, fileFault, readRecords } from '../delimited';
import type { Subject, SubjectStatus } from '../engine/types';
import { type FieldFault, InvalidError } from '../errors';
import { formatCount } from '../format';
import { armColumnFault, isArmColumn } from '../study-file/arm-columns';
import { readWrittenDate, type WrittenDate } from '../written-date';
import {
  type Listing,
  type ListingFault,
  type ListingForm,
  MOST_FAULTS,
  MOST_SUBJECTS,
  SUBJECT_STATUSES,
} from './schema';

/** What a column of a listing can hold. `censored` and `description` are ADaM's way of saying the status. */
export type ListingField =
  'study' | 'id' | 'site' | 'randomisedOn' | 'status' | 'statusOn' | 'censored' | 'description';

interface FormRule {
  /** Names as they are compared: lower case, letters and digits only. */
  names: Readonly<Record<string, ListingField>>;
  needed: readonly { field: ListingField; name: string }[];
  /** For the sentence that refuses another column. */
  sentence: string;
}

const FORMS: Record<ListingForm, FormRule> = {
  own: {
    names: {
      subject: 'id',
      id: 'id',
      subjectid: 'id',
      site: 'site',
      siteid: 'site',
      sitecode: 'site',
      randomisedon: 'randomisedOn',
      randomizedon: 'randomisedOn',
      status: 'status',
      statuson: 'statusOn',
    },
    needed: [
      { field: 'id', name: 'subject' },
      { field: 'site', name: 'site' },
      { field: 'randomisedOn', name: 'randomised on' },
      { field: 'status', name: 'status' },
      { field: 'statusOn', name: 'status on' },
    ],
    sentence: 'A listing has subject, site, randomised on, status and status on.',
  },
  adtte: {
    names: {
      studyid: 'study',
      usubjid: 'id',
      siteid: 'site',
      startdt: 'randomisedOn',
      adt: 'statusOn',
      cnsr: 'censored',
      evntdesc: 'description',
    },
    needed: [
      { field: 'id', name: 'USUBJID' },
      { field: 'site', name: 'SITEID' },
      { field: 'randomisedOn', name: 'STARTDT' },
      { field: 'statusOn', name: 'ADT' },
      { field: 'censored', name: 'CNSR' },
      { field: 'description', name: 'EVNTDESC' },
    ],
    sentence: 'An ADaM listing has STUDYID, USUBJID, SITEID, STARTDT, ADT, CNSR and EVNTDESC.',
  },
};

/** Columns that only the ADaM form has: one of them is enough to know it by. */
const ADTTE_ONLY = ['studyid', 'usubjid', 'startdt', 'adt', 'cnsr', 'evntdesc'];

const MOST_COLUMNS = 100;
const MOST_ID_CHARACTERS = 64;

const plain = (name: string): string => name.toLowerCase().replace(/[^a-z0-9]/g, '');

/** A fault of one row: the field it stands in, and what would be right. */
export interface SubjectFault {
  field: ListingField;
  detail: string;
}

/** A row as far as it could be read; a cell that could not is empty, and is told of already. */
export interface ReadSubject extends Omit<Subject, 'status'> {
  status: SubjectStatus | '';
}

/**
 * Reads a blinded subject listing. A head that can't be taken (an arm's column, an unknown or missing one) refuses the file;
 * what is wrong in the rows is collected, all of it counted. `check` adds what only the study knows, row by row.
 */
export function readListing(
  bytes: Uint8Array,
  studyCode: string,
  check: (subject: ReadSubject) => readonly SubjectFault[],
): Listing {
  const [head, ...rows] = readRecords(decodeText(bytes), MOST_SUBJECTS * 2);
  if (!head || head.every((cell) => cell === '')) throw fileFault(`The file is empty. ${FORMS.own.sentence}`);
  const { form, columns } = readHead(head);
  const filled = rows.filter((cells) => cells.some((cell) => cell !== '')).length;
  if (filled === 0) throw fileFault('The file has a head and no subjects. Give one row for each subject.');
  if (filled > MOST_SUBJECTS)
    throw fileFault(`The file has more than ${formatCount(MOST_SUBJECTS)} subjects, the most that a data cut takes.`);
  const listing: Listing = { form, rows: filled, subjects: [], faults: [], faultCount: 0 };
  const firstRowOf = new Map<string, number>();
  const dateOf = rememberDates();
  rows.forEach((cells, place) => {
    if (cells.every((cell) => cell === '')) return;
    const row = place + 2;
    const refuse = (fault: Omit<ListingFault, 'row'>): void => {
      listing.faultCount += 1;
      if (listing.faults.length < MOST_FAULTS) listing.faults.push({ row, ...fault });
    };
    if (cells.length !== columns.length) {
      const detail = `This row has ${cells.length} cells, the head ${columns.length}. A separator inside a cell needs quotation marks around it.`;
      return refuse({ column: null, value: null, detail });
    }
    const cellOf = (field: ListingField): string => cells[columns.indexOf(field)] ?? '';
    const { subject, faults: unread } = readSubject(cellOf, dateOf, { studyCode, form });
    const faults = [...unread, ...check(subject), ...repeated(subject.id, row, firstRowOf)];
    for (const { field, detail } of faults) {
      const at = columns.indexOf(field);
      refuse({ column: head[at]!, value: cells[at]!.slice(0, 100), detail });
    }
    if (faults.length === 0 && subject.status !== '')
      listing.subjects.push({ ...subject, status: subject.status, row });
  });
  return listing;
}

/** Which field stands at which place; every fault of the head at once. */
function readHead(head: readonly string[]): { form: ListingForm; columns: ListingField[] } {
  if (head.length > MOST_COLUMNS)
    throw fileFault(`The head has ${head.length} columns. ${FORMS.own.sentence} Leave the others out.`);
  const names = head.map(plain);
  const form = names.some((name) => ADTTE_ONLY.includes(name)) ? 'adtte' : 'own';
  const { names: known, needed, sentence } = FORMS[form];
  const columns = names.map((name) => known[name]);
  const faults = head.flatMap((cell, place): FieldFault[] => {
    const pointer = `/columns/${place + 1}`;
    if (isArmColumn(cell)) return [{ pointer, detail: armColumnFault(cell, place + 1) }];
    if (columns[place] === undefined) {
      const what = cell === '' ? 'has no name' : `“${cell.slice(0, 100)}”, is not one of a listing`;
      const column = cell === '' ? `Column ${place + 1} ${what}` : `Column ${place + 1}, ${what}`;
      return [{ pointer, detail: `${column}. ${sentence} Leave it out.` }];
    }
    const first = columns.indexOf(columns[place]);
    if (first < place)
      return [
        { pointer, detail: `Column ${place + 1}, “${cell}”, says the same as column ${first + 1}. Leave one out.` },
      ];
    return [];
  });
  for (const { field, name } of needed)
    if (!columns.includes(field))
      faults.push({ pointer: '/columns', detail: `There is no column “${name}”. ${sentence}` });
  if (faults.length > 0) throw new InvalidError(faults);
  return { form, columns: columns as ListingField[] };
}

/** Hundreds of thousands of cells hold some hundreds of days. */
function rememberDates(): (text: string) => WrittenDate {
  const known = new Map<string, WrittenDate>();
  return (text) => {
    const read = known.get(text) ?? readWrittenDate(text);
    if (known.size < 10_000) known.set(text, read);
    return read;
  };
}

function readSubject(
  cellOf: (field: ListingField) => string,
  readDate: (text: string) => WrittenDate,
  { studyCode, form }: { studyCode: string; form: ListingForm },
): { subject: ReadSubject; faults: SubjectFault[] } {
  const faults: SubjectFault[] = [];
  const id = cellOf('id');
  const site = cellOf('site');
  if (id === '') faults.push({ field: 'id', detail: 'This cell is empty. Give the subject’s identifier.' });
  else if (id.length > MOST_ID_CHARACTERS || /\p{Cc}/u.test(id))
    faults.push({ field: 'id', detail: `An identifier has at most ${MOST_ID_CHARACTERS} characters on one line.` });
  if (site === '') faults.push({ field: 'site', detail: 'This cell is empty. Give the site’s code.' });
  const study = cellOf('study');
  if (study !== '' && study.toLowerCase() !== studyCode.toLowerCase())
    faults.push({ field: 'study', detail: `This study is ${studyCode}. Send its own listing.` });
  const dateOf = (field: 'randomisedOn' | 'statusOn'): string => {
    const text = cellOf(field);
    const read = text === '' ? { fault: 'This cell is empty. Give a date like 2027-03-14.' } : readDate(text);
    if (read.fault === undefined) return read.date;
    faults.push({ field, detail: read.fault });
    return '';
  };
  const randomisedOn = dateOf('randomisedOn');
  const read = form === 'own' ? readStatus(cellOf('status')) : adtteStatus(cellOf('censored'), cellOf('description'));
  if (read.fault) faults.push(read.fault);
  const statusOn = dateOf('statusOn');
  return { subject: { id, site, randomisedOn, status: read.status ?? '', statusOn }, faults };
}

type StatusRead = { status: SubjectStatus; fault?: undefined } | { status?: undefined; fault: SubjectFault };

const OTHER_SPELLINGS: Readonly<Record<string, SubjectStatus>> = {
  'lost-to-follow-up': 'withdrawn',
  'end-of-follow-up': 'completed',
};

function readStatus(text: string): StatusRead {
  const written = text.toLowerCase().replace(/[\s_-]+/g, '-');
  const status = SUBJECT_STATUSES.find((one) => one === written) ?? OTHER_SPELLINGS[written];
  if (status) return { status };
  const what = text === '' ? 'This cell is empty' : `“${text.slice(0, 100)}” is no status`;
  return { fault: { field: 'status', detail: `${what}. Write one of ${SUBJECT_STATUSES.join(', ')}.` } };
}

/*
 * How ADaM's CNSR and EVNTDESC become a status; here and nowhere else.
 *   CNSR 0            the event; still to be adjudicated where EVNTDESC says "pending" or "adjudication"
 *   CNSR 1 or higher  censored, and EVNTDESC says why:
 *                     withdrawn  - withdrawal, consent, lost to follow-up, discontinued, a death that is not the event
 *                     completed  - completed, end of follow-up, end of study
 *                     at-risk    - ongoing, at risk, cut-off, event-free, alive, no event, last known
 * Words of two groups, or of none, are asked back: a censoring is not guessed at.
 */
const CENSORED_WORDS: readonly [SubjectStatus, RegExp][] = [
  ['withdrawn', /withdr|consent|\blost\b|discontinu|\bdeath\b|\bdied\b|\bdead\b/i],
  ['completed', /complet|end of (the )?(follow|study|treatment period)/i],
  ['at-risk', /ongoing|at risk|cut-?\s?off|event[- ]free|alive|no event|last known|still/i],
];

function adtteStatus(censored: string, description: string): StatusRead {
  if (!/^\d{1,3}$/.test(censored))
    return { fault: { field: 'censored', detail: 'CNSR is 0 for an event and 1 or higher for a censoring.' } };
  if (Number(censored) === 0) return { status: /pending|adjudicat/i.test(description) ? 'event-pending' : 'event' };
  const meant = CENSORED_WORDS.filter(([, words]) => words.test(description)).map(([status]) => status);
  if (meant.length === 1) return { status: meant[0]! };
  const what =
    description === ''
      ? 'EVNTDESC is empty'
      : meant.length > 1
        ? `“${description.slice(0, 100)}” reads as ${meant.join(' and as ')}`
        : `“${description.slice(0, 100)}” does not say why the subject is censored`;
  return {
    fault: {
      field: 'description',
      detail: `${what}. Write for example WITHDRAWN, LOST TO FOLLOW-UP, COMPLETED FOLLOW-UP or AT RISK AT CUT-OFF.`,
    },
  };
}

function repeated(id: string, row: number, firstRowOf: Map<string, number>): SubjectFault[] {
  if (id === '') return [];
  const first = firstRowOf.get(id);
  if (first === undefined) firstRowOf.set(id, row);
  return first === undefined
    ? []
    : [{ field: 'id', detail: `${id} stands in row ${first} already. Each subject has one row.` }];
}

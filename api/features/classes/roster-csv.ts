import { parse } from 'csv-parse/sync';
import { personLineSchema, type PersonLine, type RosterProblem } from '../../../shared/schemas/class.ts';

const HEADINGS: Readonly<Record<string, keyof PersonLine>> = {
  name: 'name',
  student: 'name',
  'full name': 'name',
  email: 'email',
  'e-mail': 'email',
  mail: 'email',
  'user name': 'userName',
  username: 'userName',
  login: 'userName',
};
const MOST_PEOPLE = 200;

export interface RosterReading {
  readonly people: readonly PersonLine[];
  readonly problems: readonly RosterProblem[];
}

/**
 * Reads a class list: comma, semicolon or tab between fields, the first line names them (name, e-mail, user name).
 * Lines that cannot be read are named, the others are kept.
 */
export function readRosterCsv(csv: string): RosterReading {
  let rows: { record: string[]; info: { lines: number } }[];
  try {
    rows = parse(csv, {
      bom: true,
      info: true,
      delimiter: [',', ';', '\t'],
      relax_column_count: true,
      skip_empty_lines: true,
      trim: true,
    }) as unknown as typeof rows;
  } catch (error) {
    return {
      people: [],
      problems: [
        { line: lineOf(error), detail: 'A quotation mark is opened and not closed, or stands inside a field.' },
      ],
    };
  }
  const [heading, ...lines] = rows;
  const fields = heading?.record.map((word) => HEADINGS[word.toLowerCase()]) ?? [];
  if (!fields.includes('name')) {
    return {
      people: [],
      problems: [{ line: 1, detail: 'The first line names the columns: name, and e-mail or user name.' }],
    };
  }
  return readLines(lines, fields);
}

function readLines(
  lines: readonly { record: string[]; info: { lines: number } }[],
  fields: readonly (keyof PersonLine | undefined)[],
): RosterReading {
  const people: PersonLine[] = [];
  const problems: RosterProblem[] = [];
  const names = new Set<string>();
  for (const { record, info } of lines) {
    const cells = fields.flatMap((field, column) =>
      field && record[column] ? [[field, record[column]] as const] : [],
    );
    const read = personLineSchema.safeParse(Object.fromEntries(cells));
    if (!read.success)
      problems.push({ line: info.lines, detail: read.error.issues[0]?.message ?? 'This line could not be read.' });
    else if (names.has(read.data.name))
      problems.push({ line: info.lines, detail: `${read.data.name} stands in the list twice.` });
    else if (people.length >= MOST_PEOPLE)
      problems.push({ line: info.lines, detail: `Only the first ${MOST_PEOPLE} people are taken.` });
    else {
      names.add(read.data.name);
      people.push(read.data);
    }
  }
  return { people, problems };
}

function lineOf(error: unknown): number {
  return typeof error === 'object' && error !== null && 'lines' in error && typeof error.lines === 'number'
    ? error.lines
    : 1;
}

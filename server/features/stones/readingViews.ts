import type { EntityManager } from 'typeorm';
import type { ReadingView } from '@shared/api/kits';
import type { Reading } from './reading.entity';
import { shownUncertainty, weighingOf } from './readingInput';

type Row = Omit<Reading, 'takenAt'> & {
  takenAt: Date;
  pass: 1 | 2 | null;
  instrumentName: string | null;
  readerName: string | null;
  strikeReason: string | null;
  struckBy: string | null;
  struckByName: string | null;
  struckAt: Date | null;
};

/** All intake readings of a stone in the order taken, struck ones included and marked. Staff only. */
export async function intakeReadingViews(tx: EntityManager, stoneId: string): Promise<ReadingView[]> {
  return (await rows(tx, `r.stone_id = $1 AND r.purpose = 'intake'`, [stoneId])).map(toView);
}

/** The readings of a stone in one bench check, each with the reader's pass. Staff only, once the record is open to them. */
export async function checkReadingViews(tx: EntityManager, loanId: string, stoneId: string): Promise<(ReadingView & { pass: 1 | 2 })[]> {
  const found = await rows(tx, `r.loan_id = $1 AND r.stone_id = $2 AND r.purpose = 'check'`, [loanId, stoneId]);
  return found.map((row) => ({ ...toView(row), pass: row.pass ?? 1 }));
}

function rows(tx: EntityManager, where: string, parameters: string[]): Promise<Row[]> {
  return tx.query<Row[]>(
    `SELECT r.id, r.attribute, r.value, r.category, r.over_limit AS "overLimit", r.air_ct AS "airCt", r.water_ct AS "waterCt",
            r.water_c AS "waterC", r.u, r.instrument_id AS "instrumentId", r.note, r.taken_at AS "takenAt", r.reader_id AS "readerId",
            b.pass, i.name AS "instrumentName", reader.name AS "readerName",
            s.reason AS "strikeReason", s.struck_by AS "struckBy", striker.name AS "struckByName", s.struck_at AS "struckAt"
       FROM reading r
       LEFT JOIN instrument i ON i.id = r.instrument_id
       LEFT JOIN account reader ON reader.id = r.reader_id
       LEFT JOIN bench_submission b ON b.id = r.submission_id
       LEFT JOIN reading_strike s ON s.reading_id = r.id
       LEFT JOIN account striker ON striker.id = s.struck_by
      WHERE ${where} ORDER BY r.taken_at, r.position, r.id`,
    parameters,
  );
}

function toView(row: Row): ReadingView {
  return {
    id: row.id,
    attribute: row.attribute,
    value: row.category ?? (row.overLimit === null ? (row.value ?? Number.NaN) : 'over_limit'),
    u: shownUncertainty(row),
    limit: row.overLimit,
    weighing: weighingOf(row),
    instrument: row.instrumentId === null ? null : { id: row.instrumentId, name: row.instrumentName ?? '' },
    reader: { id: row.readerId, name: row.readerName ?? '' },
    takenAt: row.takenAt.toISOString(),
    note: row.note,
    struck: struckOf(row),
  };
}

function struckOf({ strikeReason, struckBy, struckByName, struckAt }: Row): ReadingView['struck'] {
  if (strikeReason === null || struckBy === null || struckAt === null) return null;
  return { reason: strikeReason, by: { id: struckBy, name: struckByName ?? '' }, at: struckAt.toISOString() };
}

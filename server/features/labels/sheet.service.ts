import type { EntityManager } from 'typeorm';
import type { LabelSheetRequest } from '@shared/api/labels';
import type { Database } from '@/server/database/data-source';
import { withSchool, type SchoolActor } from '@/server/database/school';
import { invalid } from '@/server/http/problem';
import type { FieldError } from '@/server/http/problem';
import { LabelSheetRefused, makeLabelSheet, type SheetLabel } from './label-sheet';

/** The valid labels of these kits as a PDF, kit by kit as asked, each kit's own label before its jars'. Throws `Invalid` naming what to change. */
export async function labelSheet(db: Database, actor: SchoolActor, request: LabelSheetRequest, publicUrl: string): Promise<Buffer> {
  const labels = await withSchool(db, actor, (tx) => labelsToPrint(tx, request.kitIds));
  const { page, size, startAt } = request;
  try {
    return await makeLabelSheet({ labels, page, size, startAt, publicUrl });
  } catch (error) {
    if (error instanceof LabelSheetRefused) throw invalid(error.field === 'labels' ? 'kitIds' : error.field, error.message);
    throw error;
  }
}

interface LabelRow { readonly kitId: string; readonly code: string; readonly kitNumber: string; readonly slot: string | null; readonly school: string }

async function labelsToPrint(tx: EntityManager, kitIds: readonly string[]): Promise<SheetLabel[]> {
  const wanted = [...new Set(kitIds.map((id) => id.toLowerCase()))];
  const rows = await tx.query<LabelRow[]>(
    `SELECT l.kit_id AS "kitId", l.code, k.number AS "kitNumber", s.slot, c.name AS school
       FROM label l JOIN kit k ON k.id = l.kit_id JOIN school c ON c.id = l.school_id LEFT JOIN stone s ON s.id = l.stone_id
      WHERE l.kit_id = ANY ($1::uuid[]) AND l.voided_at IS NULL
      ORDER BY array_position($1::uuid[], l.kit_id), s.slot NULLS FIRST`,
    [wanted],
  );
  const withLabels = new Set(rows.map(({ kitId }) => kitId));
  const bare: FieldError[] = kitIds.flatMap((id, index) =>
    (withLabels.has(id.toLowerCase()) ? [] : [{ field: `kitIds[${index}]`, message: 'This kit has no labels yet. Issue them first.' }]));
  if (bare.length > 0) throw invalid(bare);
  return rows.map(({ code, kitNumber, slot, school }) => ({ code, kitNumber, line: school, ...(slot === null ? {} : { slot }) }));
}

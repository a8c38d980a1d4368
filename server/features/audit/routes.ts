import type { Deps } from '#server/deps.ts';
import { selectAudit } from '#server/features/audit/store.ts';
import { route, type Route } from '#server/http/route.ts';
import { listAudit } from '#shared/contracts/audit.ts';

export function auditRoutes(deps: Deps): Route[] {
  return [
    route(listAudit, async ({ query: { page, pageSize, q } }) => {
      const { total, rows } = await selectAudit(deps.db, q, pageSize, (page - 1) * pageSize);
      return {
        total,
        page,
        pageSize,
        rows: rows.map((row) => ({ ...row, id: String(row.id), at: row.at.toISOString() })),
      };
    }),
  ];
}

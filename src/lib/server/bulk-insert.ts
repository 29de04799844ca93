import { getTableColumns, getTableName, type InferInsertModel, type SQL, sql } from 'drizzle-orm';
import type { SQLiteTable } from 'drizzle-orm/sqlite-core';

/**
 * One INSERT for any number of rows: they travel as one JSON value, and SQLite takes them apart. Building a statement with a
 * parameter for every value costs many times more than storing them. Column encodings and defaults are the table's own.
 */
export function bulkInsert<T extends SQLiteTable>(table: T, rows: readonly InferInsertModel<T>[]): SQL {
  const columns = Object.entries(getTableColumns(table));
  const names = sql.join(
    columns.map(([, column]) => sql.identifier(column.name)),
    sql`, `,
  );
  const values = sql.join(
    columns.map((_, i) => sql.raw(`value ->> ${i}`)),
    sql`, `,
  );
  const encoded = rows.map((row) => columns.map(([key, column]) => encode(column, row[key as keyof typeof row])));
  return sql`INSERT INTO ${sql.identifier(getTableName(table))} (${names}) SELECT ${values} FROM json_each(${JSON.stringify(encoded)})`;
}

type Column = ReturnType<typeof getTableColumns>[string];

function encode(column: Column, given: unknown): unknown {
  const value = given === undefined ? column.default : given;
  return value === undefined || value === null ? null : column.mapToDriverValue(value);
}

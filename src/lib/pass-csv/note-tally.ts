const ROWS_NAMED = 5;

/** Collects what has to be said about rows, so that a thousand rows with the same remark give one sentence. */
export class NoteTally {
  private readonly rowsByText = new Map<string, number[]>();

  add(text: string, row: number): void {
    const rows = this.rowsByText.get(text);
    if (rows) rows.push(row);
    else this.rowsByText.set(text, [row]);
  }

  /** One sentence per remark, in the order they first came up: "Row 3: ..." or "Rows 3, 5 and 8 more: ...". */
  sentences(): string[] {
    return [...this.rowsByText].map(([text, rows]) => `${nameRows(rows)}: ${text}`);
  }
}

function nameRows(rows: readonly number[]): string {
  const named = rows.slice(0, ROWS_NAMED).join(', ');
  const more = rows.length > ROWS_NAMED ? ` and ${rows.length - ROWS_NAMED} more` : '';
  return `${rows.length === 1 ? 'Row' : 'Rows'} ${named}${more}`;
}

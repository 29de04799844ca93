import type { SheetShown } from '@/components/sheet/shown';
import { can } from '@/lib/domain/permissions';
import { type CarView, listCars } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { currentSheet, getSheet, listSheets, type SheetView } from '@/lib/server/sheets';
import { getSuggestion, type SuggestionView } from '@/lib/server/suggestions';

/** The current sheet of the car asked for; else of the car whose sheet is newest. */
export async function loadCurrent(ctx: ServerContext, carId: string | null): Promise<SheetShown> {
  const cars = await listCars(ctx);
  const sheets = await Promise.all(cars.map((car) => currentSheet(ctx, { carId: car.id })));
  const asked = carId === null ? -1 : cars.findIndex((car) => car.id === carId);
  const index = asked >= 0 ? asked : newestIndex(sheets);
  return shown(ctx, sheets[index] ?? null, cars, cars[index] ?? cars[0] ?? null);
}

/** One sheet, superseded or not. Throws NOT_FOUND. */
export async function loadSheet(ctx: ServerContext, sheetId: string): Promise<SheetShown> {
  const sheet = await getSheet(ctx, sheetId);
  const cars = await listCars(ctx);
  return shown(ctx, sheet, cars, cars.find((car) => car.id === sheet.carId) ?? null);
}

async function shown(
  ctx: ServerContext,
  sheet: SheetView | null,
  cars: CarView[],
  car: CarView | null,
): Promise<SheetShown> {
  const sheets = sheet ? await listSheets(ctx, { carId: sheet.carId }) : [];
  return { sheet, sheets, suggestion: await oddsFor(ctx, sheet), cars, car };
}

async function oddsFor(ctx: ServerContext, sheet: SheetView | null): Promise<SuggestionView | null> {
  if (!sheet || !can(ctx.role, 'suggestion:view')) return null;
  return getSuggestion(ctx, sheet.suggestionId);
}

function newestIndex(sheets: readonly (SheetView | null)[]): number {
  const times = sheets.map((sheet) => (sheet ? Date.parse(sheet.createdAt) : 0));
  return Math.max(0, times.indexOf(Math.max(...times)));
}

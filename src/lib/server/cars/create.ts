import { randomUUID } from 'node:crypto';
import { adjustable, car } from '@/db/schema';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import type { Adjustable } from '@/lib/domain/types';
import { carInput, siLengths } from '@/lib/forms/car';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { validationError } from '../errors';
import { getCar } from './list';
import { type AdjustableFields, adjustableRow } from './rows';
import { adjustableProblems, carProblems } from './rules';
import type { CarView } from './view';

/**
 * Adds a car with its adjustables; without a list it gets the usual five. Throws VALIDATION, or CONFLICT when the team has a
 * car of that name.
 */
export async function createCar(ctx: ServerContext, raw: unknown): Promise<CarView> {
  requireCan(ctx, 'car:edit');
  const { adjustables = DEFAULT_ADJUSTABLES.map(asFields), ...input } = carInput.parse(raw);
  refuseProblems({ ...carProblems(input), ...listProblems(adjustables) });
  const row = carRow(ctx, input);
  const settable = adjustables.map((fields, index) => adjustableRow(ctx, row.id, fields, index));
  await refuseDuplicate('name', `Your team has a car named ${row.name} already. Choose another name.`, () =>
    ctx.write((db) =>
      db.batch([
        db.insert(car).values(row),
        ...settable.map((values) => db.insert(adjustable).values(values)),
        auditInsert(db, ctx, 'car.create', { type: 'car', id: row.id }, { name: row.name }),
      ]),
    ),
  );
  return getCar(ctx, row.id);
}

type CarFields = Omit<ReturnType<typeof carInput.parse>, 'adjustables'>;

function carRow(ctx: ServerContext, input: CarFields): typeof car.$inferInsert {
  const { rolloutIn, frontRolloutIn, rolloutGrowthPctAt100Mph, rolloutGrowthPctAt100Kmh, ...columns } = input;
  const twins = { rolloutIn, frontRolloutIn, rolloutGrowthPctAt100Mph, rolloutGrowthPctAt100Kmh };
  const createdAt = ctx.now().toISOString();
  return { ...columns, ...siLengths({ ...columns, ...twins }), id: randomUUID(), teamId: ctx.team.id, createdAt };
}

function asFields({ belief, ...rest }: Adjustable): AdjustableFields {
  return { ...rest, beliefMeanPct: belief?.meanPct ?? null, beliefSdPct: belief?.sdPct ?? null };
}

function listProblems(list: readonly AdjustableFields[]): Record<string, string> {
  const keys = list.map((fields) => fields.key);
  const twice = keys.find((key, index) => keys.indexOf(key) !== index);
  if (twice !== undefined)
    throw validationError(`The key ${twice} is there twice.`, { adjustables: 'Use each key once.' });
  return Object.fromEntries(
    list.flatMap((fields, index) =>
      Object.entries(adjustableProblems(fields)).map(([name, message]) => [`adjustables.${index}.${name}`, message]),
    ),
  );
}

import type { Adjustable, Band, PassRecord } from '../types';
import { type ColumnSet, chooseColumns } from './columns';
import { MIN_PASSES } from './constants';
import { buildDesign } from './design';
import { type SeenRanges, seenRanges } from './experience';
import { inOrder, type RunFeatures, roundsBefore, runFeatures, trains } from './features';
import { type FitInput, fitPosterior, type Posterior } from './fit';
import { recalibrationFactor } from './recalibration';

/** A pass with what the model looks at, worked out once. */
export interface PreparedPass {
  pass: PassRecord;
  features: RunFeatures;
}

export interface TrainedModel {
  adjustables: readonly Adjustable[];
  band: Band;
  /** All passes given, in order; `rows` are those that train. */
  prepared: readonly PreparedPass[];
  rows: readonly PreparedPass[];
  columnSet: ColumnSet;
  input: FitInput;
  posterior: Posterior;
  eventIndex: ReadonlyMap<string, number>;
  recalibration: number;
  ranges: SeenRanges;
}

/** Works out the features of every pass, in the order they were run. */
export function preparePasses(passes: readonly PassRecord[]): PreparedPass[] {
  const ordered = inOrder(passes);
  const rounds = roundsBefore(ordered);
  return ordered.map((pass, i) => ({ pass, features: runFeatures(pass, rounds[i]!) }));
}

/**
 * Fits the traction model to the passes that train (measured slip, not aborted, not excluded).
 * Returns null with fewer than MIN_PASSES of them, or when the fit fails.
 */
export function trainModel(
  prepared: readonly PreparedPass[],
  adjustables: readonly Adjustable[],
  band: Band,
): TrainedModel | null {
  const rows = prepared.filter((p) => trains(p.pass));
  if (rows.length < MIN_PASSES) return null;
  const runs = rows.map((r) => r.features);
  const columnSet = chooseColumns(runs, adjustables, band);
  const { input, eventIndex } = fitInput(rows, columnSet);
  const posterior = fitPosterior(input);
  if (!posterior) return null;
  const recalibration = recalibrationFactor(input, posterior);
  return {
    adjustables,
    band,
    prepared,
    rows,
    columnSet,
    input,
    posterior,
    eventIndex,
    recalibration,
    ranges: seenRanges(runs),
  };
}

function fitInput(
  rows: readonly PreparedPass[],
  columnSet: ColumnSet,
): { input: FitInput; eventIndex: Map<string, number> } {
  const design = buildDesign(
    rows.map((r) => r.features),
    columnSet.columns,
  );
  const eventIndex = new Map<string, number>();
  const event = Int32Array.from(rows, ({ features }) => {
    if (!eventIndex.has(features.event)) eventIndex.set(features.event, eventIndex.size);
    return eventIndex.get(features.event)!;
  });
  const y = Float64Array.from(rows, ({ pass }) => Math.log(pass.slipPct!));
  const measurementVariance = Float64Array.from(rows, ({ pass }) => ((pass.slipSdPct ?? 0) / pass.slipPct!) ** 2);
  return { input: { design, y, event, events: eventIndex.size, measurementVariance }, eventIndex };
}

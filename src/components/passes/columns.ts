import { type UnitSystem, unitLabel } from '@/lib/domain/display';

export interface Column {
  /** Name of the sort the server knows. */
  sort: string;
  label: string;
  /** Small, under the label. */
  unit?: string;
  numeric?: boolean;
}

/** The columns in reading order. */
export function columnsOf(et: { field: string; label: string }, units: UnitSystem): Column[] {
  return [
    { sort: 'passNo', label: 'Pass' },
    { sort: 'runAt', label: 'Run' },
    { sort: 'event', label: 'Event' },
    { sort: 'round', label: 'Round' },
    { sort: 'lane', label: 'Lane' },
    { sort: 'trackTempC', label: 'Track', unit: unitLabel('trackTemperature', units), numeric: true },
    { sort: 'densityAltitude', label: 'Density\nalt.', unit: unitLabel('altitude', units), numeric: true },
    { sort: 'slipPct', label: 'Slip' },
    { sort: 'outcome', label: 'Outcome' },
    { sort: 'sixtyFtS', label: '60 ft', unit: 's', numeric: true },
    { sort: et.field, label: et.label, unit: 's', numeric: true },
  ];
}

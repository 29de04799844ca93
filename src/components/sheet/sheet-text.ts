import { plain, withUnit } from '@/components/site/numbers';
import type { SheetItem, SheetView } from '@/lib/server/sheets';

/** "7,000 rpm" split for the large figures: number and unit are set apart. */
export const itemNumber = (item: SheetItem): string => plain(item.value);

/** "was 7,200" for a setting that changes. */
export const wasText = (item: SheetItem): string | null => (item.from === null ? null : `was ${plain(item.from)}`);

export const ofGroup = (sheet: SheetView, group: SheetItem['group']): SheetItem[] =>
  sheet.items.filter((item) => item.group === group);

type Change = SheetView['changes'][number];

/** "11 to 11.5 g, one step up" without the name. */
export const changeMove = (change: Change): string => `${plain(change.from)} to ${withUnit(change.to, change.unit)}`;

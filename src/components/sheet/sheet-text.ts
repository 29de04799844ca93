import { settingNumber, settingText, type ValueSpec } from '@/components/suggestion/settings';
import type { SheetItem, SheetView } from '@/lib/server/sheets';

/** "7,000": number and unit are set apart on the sheet. */
export const itemNumber = (item: SheetItem): string => settingNumber(item.value, item);

/** "was 7,200" for a setting that changes. */
export const wasText = (item: SheetItem): string | null =>
  item.from === null ? null : `was ${settingNumber(item.from, item)}`;

export const ofGroup = (sheet: SheetView, group: SheetItem['group']): SheetItem[] =>
  sheet.items.filter((item) => item.group === group);

/** "11.0 to 11.5 g" */
export const changeMove = (change: { from: number; to: number } & ValueSpec): string =>
  `${settingNumber(change.from, change)} to ${settingText(change.to, change)}`;

import type { Injector } from '@angular/core';
import { MatBottomSheet } from '@angular/material/bottom-sheet';
import { StopSheet, type StopSheetData } from './stop-sheet';

/** Loaded by `StopSheetOpener`, with all that a sheet over the page needs. */
export function openStopSheet(injector: Injector, data: StopSheetData): void {
  injector.get(MatBottomSheet).open<StopSheet, StopSheetData>(StopSheet, { data, ariaLabel: data.title });
}

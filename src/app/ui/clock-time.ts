const formats = new Map<string, Intl.DateTimeFormat>();

/** The clock on the mill's wall: "10:09". */
export function clockTime(at: number, timeZone: string): string {
  let format = formats.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone });
    formats.set(timeZone, format);
  }
  return format.format(at);
}

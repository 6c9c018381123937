/** The usual caution where somebody is sent to a stopped loom. */
export const CAUTION =
  'Stop and isolate the loom before putting hands near sley, shuttle or drive; follow the mill’s rules, the maker’s manual and the law. This book never says that a loom is safe to touch.';

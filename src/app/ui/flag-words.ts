/** One for screens and sheets: `shared/sheet`. */
export * from '@shared/sheet/flag-words';

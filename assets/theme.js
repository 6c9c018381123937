// The theme a person chose (src/app/shell/theme.ts writes it), set before the first paint.
try {
  const theme = localStorage.getItem('shedbeat.theme');
  if (theme === 'light' || theme === 'dark') document.documentElement.dataset.theme = theme;
} catch {
  // No storage: the device's own theme it is.
}

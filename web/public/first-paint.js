// Runs before the first paint, so that a chosen theme never flashes the other one. The key is that of state/theme.ts.
try {
  const theme = localStorage.getItem('duskround.theme');
  if (theme === 'day' || theme === 'night' || theme === 'red') document.documentElement.dataset.theme = theme;
} catch {
  // A browser that keeps nothing still shows the theme of the device.
}

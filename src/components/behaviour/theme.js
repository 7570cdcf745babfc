// Runs before the page is painted, so that a remembered theme never flashes the other one.
document.documentElement.dataset.scripted = '';
try {
  const theme = localStorage.getItem('theme');
  if (theme === 'light' || theme === 'dark') document.documentElement.dataset.theme = theme;
} catch {
  // A browser that keeps nothing follows the system's theme.
}

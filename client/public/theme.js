// Runs before the first paint, so that a chosen theme never flickers in from the other one.
try {
  const chosen = localStorage.getItem('tockwell-theme');
  if (chosen === 'light' || chosen === 'dark') document.documentElement.dataset.theme = chosen;
  // The bench is worked at night light unless somebody chose otherwise.
  else if (/^\/bench(\/|$)/.test(location.pathname))
    document.documentElement.dataset.theme = 'dark';
} catch {
  // Without storage the system's wish decides.
}

/* Sets the theme before the first paint; a file of its own because the page allows no inline script.
   components/theme.ts writes the same key and keeps the attribute up to date afterwards. */
(function () {
  var choice = null;
  try {
    choice = localStorage.getItem('idem.theme');
  } catch {
    /* Storage may be switched off: the system's choice then counts. */
  }
  var dark = window.matchMedia('(prefers-color-scheme: dark)').matches;
  var named = choice === 'paper' || choice === 'night' || choice === 'dome';
  document.documentElement.dataset.theme = named ? choice : dark ? 'night' : 'paper';
})();

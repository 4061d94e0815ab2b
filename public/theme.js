// Sets the theme before the first paint. A file of its own because the content policy forbids
// inline scripts. The key and the values are those of src/composables/useTheme.ts.
(function () {
  var chosen = null;
  try {
    chosen = localStorage.getItem('heddle.theme');
  } catch {
    // Storage may be closed to this page; the system's preference decides then.
  }
  var dark =
    chosen === 'dark' || (chosen !== 'light' && matchMedia('(prefers-color-scheme: dark)').matches);
  document.documentElement.dataset.theme = dark ? 'dark' : 'light';
})();

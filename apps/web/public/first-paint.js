/* global document, localStorage, matchMedia */
// Runs before the first paint so that the chosen scheme never flashes through another. A separate file, because the
// content security policy allows no inline script. Keys as in src/theme/useThemeChoice.ts.
(function () {
  var scheme = 'light';
  try {
    var mode = localStorage.getItem('faintward-mode') || 'system';
    var dark = localStorage.getItem('faintward-scheme-dark') || 'dark';
    if (mode === 'dark') scheme = dark;
    else if (mode === 'system' && matchMedia('(prefers-color-scheme: dark)').matches) scheme = dark;
  } catch (error) {
    // Storage can be forbidden (private windows): then the light scheme stands, and nothing else is affected.
    void error;
  }
  document.documentElement.setAttribute('data-theme', scheme);
})();

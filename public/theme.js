// Sets the theme before the first paint; the choice is kept on this device.
(() => {
  const key = 'evenlay:theme';
  const apply = (theme) => {
    if (theme === 'dusk') document.documentElement.dataset.theme = 'dusk';
    else delete document.documentElement.dataset.theme;
  };
  let theme = null;
  try {
    theme = localStorage.getItem(key);
  } catch {
    // Storage is shut off: the light theme it is.
  }
  apply(theme);
  window.evenlayTheme = {
    get: () => (document.documentElement.dataset.theme === 'dusk' ? 'dusk' : 'day'),
    set: (next) => {
      apply(next);
      try {
        localStorage.setItem(key, next);
      } catch {
        // Kept for this page only.
      }
      window.dispatchEvent(new CustomEvent('evenlay:theme'));
    },
  };
})();

// Runs before the first paint, so a stored theme never flashes the other one. Kept apart from index.html because
// the content security policy allows no inline script.
(function () {
  var stored = null;
  try {
    stored = localStorage.getItem('groundsel.theme');
  } catch (error) {
    if (!(error instanceof DOMException)) throw error; // storage is switched off: follow the system
  }
  if (stored === 'light' || stored === 'dark') document.documentElement.dataset.theme = stored;
})();

'use strict';
// The hosted page keeps itself for the field: a service worker holds all of its files. A newer version is fetched beside
// the present one and offered; it never takes over by itself. Where there is no worker (a private window, a refusal),
// the page works as long as its server does, and nothing is said.
(() => {
  const L = globalThis.levelspan, root = document.documentElement, bar = document.getElementById('levelspan-offer');
  const says = bar.querySelector('p'), which = bar.querySelector('small'), [now, later] = bar.querySelectorAll('button');
  let workers = null;
  try { workers = navigator.serviceWorker; } catch (e) { /* none, then */ }
  if (!workers) return;

  // ask puts a question to the worker that serves this page. No answer is null.
  const ask = what => new Promise(done => {
    try {
      const line = new MessageChannel();
      line.port1.onmessage = e => done(e.data);
      workers.controller.postMessage(what, [line.port2]);
      setTimeout(done, 10000, null);
    } catch (e) { done(null); }
  });

  // The offer takes a strip of the window for itself, so it waits while a finger is down or something is being typed.
  let wanted = '', put = '';                            // the version to offer, and the one put off
  const busy = () => document.querySelector('#levelspan-layer.held') || document.activeElement instanceof HTMLInputElement;
  const show = () => {
    if (wanted && busy()) { setTimeout(show, 400); return; }
    const on = !!wanted && wanted !== put;
    now.hidden = later.hidden = !on;
    root.toggleAttribute('data-offer', on);
    says.textContent = on ? 'A newer version is ready.' : '';
    which.textContent = on ? wanted : '';
    dispatchEvent(new Event('resize'));
  };
  const look = async () => {
    const ready = await ask('which');
    if (!ready) return;
    root.dataset.offline = 'true';
    const offer = ready.taken && ready.version === root.dataset.version ? '' : ready.version;
    if (offer !== wanted) { wanted = offer; show(); }
  };

  // What could not be saved would be lost with the page: then it takes a second press.
  let unsaved = false, warned = false;
  const store = L.store;
  L.store = (area, what, key, value) => {
    const answer = store(area, what, key, value);
    if (area !== 'localStorage') return answer;
    if (answer[0] !== 'ok' && answer[0] !== 'none') unsaved = true;
    else if (what === 'set' && /^levelspan\/case\//.test(key)) unsaved = false;
    return answer;
  };
  now.onclick = async () => {
    if (unsaved && !warned) {
      warned = true;
      says.textContent = 'The case is not saved here. Save a file first, or press again.';
      which.textContent = '';
      return;
    }
    now.disabled = true;
    await ask('take');
    location.reload();
  };
  later.onclick = () => { put = wanted; show(); };

  let started = false;
  const start = async () => {
    if (started) return;
    started = true;
    try {
      workers.addEventListener('controllerchange', look);
      const mine = await workers.register('sw.js', {updateViaCache: 'none'});
      if (workers.controller) look();
      let asked = Date.now();
      document.addEventListener('visibilitychange', () => {
        if (document.hidden || Date.now() - asked < 36e5) return;
        asked = Date.now();
        mine.update().catch(() => {});
      });
    } catch (e) { /* the page works without */ }
  };
  // Not before the first chart: the program has the network and the processor to itself. But a version that does not
  // start must not keep the next one away.
  new MutationObserver((_, watch) => {
    if (root.dataset.ready === 'true' || root.dataset.problem) { watch.disconnect(); start(); }
  }).observe(root, {attributes: true, attributeFilter: ['data-ready', 'data-problem']});
  setTimeout(start, 60000);
})();

'use strict';
// Pointers and keys. One layer over the drawing takes every pointer, whatever element it starts on, keeps it by
// capture until it ends, and always says how it ended.
(() => {
  const L = globalThis.levelspan;
  const layer = document.getElementById('levelspan-layer');
  const down = new Map();            // pointerId -> where it went down
  let lastPointer = -1e9;            // when a pointer last went down or up, ms

  const at = (e, more) => Object.assign({pointer: e.pointerId, touch: e.pointerType !== 'mouse', x: e.clientX, y: e.clientY,
    time: e.timeStamp}, more);
  const isText = el => el instanceof HTMLInputElement && el.dataset.control !== undefined;
  const typing = el => isText(el) && document.activeElement === el;

  layer.addEventListener('pointerdown', e => {
    if (typing(e.target)) return;                       // the caret is the browser's business
    if (e.pointerType === 'mouse' && e.button !== 0) return;
    if (down.has(e.pointerId)) return;
    lastPointer = e.timeStamp;
    down.set(e.pointerId, {x: e.clientX, y: e.clientY, target: e.target});
    try { layer.setPointerCapture(e.pointerId); } catch (err) { /* the pointer is gone already: its end follows */ }
    layer.classList.add('held');
    L.push(L.DOWN, at(e));
  });
  layer.addEventListener('pointermove', e => {
    if (down.has(e.pointerId)) L.push(L.MOVE, at(e));
  });
  const end = (e, kind) => {
    const start = down.get(e.pointerId);
    if (!start) return;
    lastPointer = e.timeStamp;
    down.delete(e.pointerId);
    if (!down.size) layer.classList.remove('held');
    L.push(kind, at(e));
    // A text field is focused here, inside the gesture, or a tablet shows no keyboard.
    if (kind === L.UP && isText(start.target) && Math.hypot(e.clientX - start.x, e.clientY - start.y) < 8) {
      start.target.focus({preventScroll: true});
    }
  };
  layer.addEventListener('pointerup', e => end(e, L.UP));
  layer.addEventListener('pointercancel', e => end(e, L.CANCEL));
  layer.addEventListener('lostpointercapture', e => end(e, L.CANCEL));
  const cancelAll = () => {
    for (const id of [...down.keys()]) {
      down.delete(id);
      L.push(L.CANCEL, {pointer: id});
    }
    layer.classList.remove('held');
  };
  addEventListener('blur', cancelAll);
  document.addEventListener('visibilitychange', () => { if (document.hidden) cancelAll(); });

  // Focus follows the program, not the mouse; and nothing here selects, scrolls, zooms or opens a menu.
  layer.addEventListener('mousedown', e => { if (!typing(e.target)) e.preventDefault(); });
  layer.addEventListener('touchstart', e => { if (!typing(e.target)) e.preventDefault(); }, {passive: false});
  layer.addEventListener('contextmenu', e => { if (!typing(e.target)) e.preventDefault(); });
  for (const t of ['gesturestart', 'gesturechange', 'gestureend']) {
    document.addEventListener(t, e => e.preventDefault(), {passive: false});
  }
  layer.addEventListener('scroll', () => { layer.scrollLeft = layer.scrollTop = 0; });

  layer.addEventListener('wheel', e => {
    if (e.ctrlKey) return;                              // page zoom is the browser's
    e.preventDefault();
    const unit = e.deltaMode === 1 ? 40 : e.deltaMode === 2 ? innerHeight : 1;
    L.push(L.WHEEL, {x: e.clientX, y: e.clientY, dx: e.deltaX * unit, dy: e.deltaY * unit, shift: e.shiftKey, time: e.timeStamp});
  }, {passive: false});

  // A click that no pointer made comes from a screen reader or a script. It is an intent, not a place.
  layer.addEventListener('click', e => {
    const el = e.target.closest('[data-control]');
    if (!el || isText(el)) return;
    if (e.detail !== 0 && e.timeStamp - lastPointer < 1000) return;
    L.push(L.ACTIVATE, {id: el.dataset.control});
  });

  const KEYS = {ArrowLeft: 1, ArrowRight: 2, ArrowUp: 3, ArrowDown: 4, PageUp: 5, PageDown: 6, Home: 7, End: 8, Enter: 9,
    ' ': 10, Escape: 11, Backspace: 12, Delete: 13};
  const COMMANDS = {z: 15, y: 16, o: 17, s: 18};
  const keyOf = e => {
    if (e.altKey) return 0;
    if (e.ctrlKey || e.metaKey) {
      const k = e.key.toLowerCase();
      return k === 'z' && e.shiftKey ? 16 : COMMANDS[k] || 0;
    }
    return KEYS[e.key] || 0;
  };
  const runeOf = e => !e.ctrlKey && !e.metaKey && !e.altKey && [...e.key].length === 1 && e.key !== ' ' ? e.key.codePointAt(0) : 0;
  const elsewhere = el => el && el.closest && el.closest('#levelspan-copy,#levelspan-stop,#levelspan-shell,#levelspan-offer');

  addEventListener('keydown', e => {
    if (elsewhere(e.target) || document.documentElement.dataset.ready !== 'true') return;
    const el = e.target.closest ? e.target.closest('[data-control]') : null;
    const id = el ? el.dataset.control : '';
    if (isText(el)) {                                   // the field edits itself; it only tells when it is done
      if (e.isComposing || (e.key !== 'Enter' && e.key !== 'Escape')) return;
      e.preventDefault();
      L.push(L.KEY, {key: KEYS[e.key], id, time: e.timeStamp});
      el.blur();
      return;
    }
    const key = keyOf(e), rune = key ? 0 : runeOf(e);
    if (!key && !rune) return;                          // Tab, function keys and shortcuts stay the browser's
    e.preventDefault();
    L.push(L.KEY, {key, rune: key === 10 ? 32 : rune, shift: e.shiftKey, id, time: e.timeStamp});
  });
  addEventListener('keyup', e => {                      // or some browsers click a button on the key's release
    if ((e.key === ' ' || e.key === 'Enter') && e.target.closest && e.target.closest('#levelspan-layer') && !isText(e.target)) e.preventDefault();
  });
})();

'use strict';
// globalThis.levelspan: all that the program asks of the browser. Whatever can throw is caught here, because an
// exception that unwinds through the program would leave it wrecked.
(() => {
  const byId = id => document.getElementById(id);
  const L = globalThis.levelspan = {log: '', dead: false};

  // The queue. An event is WIDTH numbers; -1 or the index of a string where it carries text. See wasm/wire.go.
  const WIDTH = 14, MOST = 512, HEAD = 8;
  const queue = new Float64Array(HEAD + WIDTH * MOST);
  L.bytes = new Uint8Array(queue.buffer);
  let count = 0, strings = [], files = [];
  // Frames. The software surface paints on request. The drawing library asks for a frame after every frame; its
  // requests are parked while nothing happens, or for ever once it has been left.
  const raf = window.requestAnimationFrame.bind(window), QUIET = 300;
  let asked = false, parked = null, woken = 0, left = false, pen = null, scratch = null;
  L.wake = () => {
    if (L.dead) return;
    woken = performance.now();
    L.owe();
    if (pen) {
      if (asked) return;
      asked = true;
      raf(() => {
        asked = false;
        if (!L.dead) L.onpaint(document.body.clientWidth, document.body.clientHeight, devicePixelRatio);
      });
      return;
    }
    if (L.onwake) L.onwake();
    if (parked && !left) { const f = parked; parked = null; raf(f); }
  };
  // later asks for a frame after so many milliseconds, instead of the time asked for before; negative: not at all.
  let alarm = 0;
  L.later = ms => {
    clearTimeout(alarm);
    if (ms >= 0) alarm = setTimeout(L.wake, ms);
  };
  // The program's own timers are the drawing library's alone: ten times a second it looks whether the page is hidden, for
  // the sound that is not there. While nothing happens it may look now and then.
  L.patience = ms => performance.now() - woken > 1000 ? Math.max(ms, 5000) : ms;
  L.park = () => {
    window.requestAnimationFrame = f => {
      if (left || performance.now() - woken > QUIET) { parked = f; return 0; }
      return raf(f);
    };
    woken = performance.now() + 1e4;                    // its first frames come whatever happens
  };
  // lose leaves the drawing library: its canvas and its frames go.
  L.lose = () => {
    if (left) return;
    left = true;
    parked = null;
    for (const c of document.querySelectorAll('body>canvas')) if (!pen || c !== pen.canvas) c.remove();
    if (L.onlost) L.onlost();
  };
  L.software = () => {
    L.lose();
    const c = document.createElement('canvas');
    c.setAttribute('aria-hidden', 'true');
    c.width = c.height = 1;
    document.body.append(c);
    pen = c.getContext('2d', {alpha: false});
    if (pen) L.wake(); else L.fail('The browser gives no canvas to draw on.');
  };
  L.picture = (w, h) => {
    pen.canvas.width = w;
    pen.canvas.height = h;
    pen.canvas.style.width = w / devicePixelRatio + 'px';
    pen.canvas.style.height = h / devicePixelRatio + 'px';
    scratch = new Uint8ClampedArray(4 * w * h);
    return scratch;
  };
  L.blit = (x, y, w, h) => pen.putImageData(new ImageData(scratch.subarray(0, 4 * w * h), w, h), x, y);
  L.resized = () => { if (pen) L.wake(); else if (L.onlost) L.lose(); };
  const text = s => s === undefined ? -1 : strings.push(String(s)) - 1;

  // push notes one event and asks for a frame. A queue that is full drops moves and keeps what ends a gesture.
  L.push = (kind, e = {}) => {
    if (L.dead) return;
    if (count === MOST) {
      const at = oldestMove();
      if (at < 0) return;
      queue.copyWithin(HEAD + at * WIDTH, HEAD + (at + 1) * WIDTH, HEAD + count * WIDTH);
      count--;
    }
    const v = [kind, e.pointer || 0, e.touch ? 1 : 0, e.x || 0, e.y || 0, e.dx || 0, e.dy || 0, e.key || 0,
      e.rune || 0, e.shift ? 1 : 0, e.value || 0, e.time || performance.now(), text(e.id), text(e.text)];
    queue.set(v, HEAD + count * WIDTH);
    count++;
    if (L.hush) L.hush();                               // what waits to be read out waits for the hand to rest
    L.wake();
  };
  const oldestMove = () => {
    for (let i = 0; i < count; i++) if (queue[HEAD + i * WIDTH] === L.MOVE || queue[HEAD + i * WIDTH] === L.WHEEL) return i;
    return -1;
  };
  Object.assign(L, {DOWN: 0, MOVE: 1, UP: 2, CANCEL: 3, WHEEL: 4, KEY: 5, FOCUS: 6, ACTIVATE: 7, VALUE: 8, TEXT: 9,
    FILE: 100, LINK: 101, NOTICE: 102, FAILURE: 103, PASTE: 104});

  // drain fills the head (insets, palette) and gives the number of events; the program copies L.bytes next.
  const dark = window.matchMedia ? matchMedia('(prefers-color-scheme: dark)') : {matches: false};
  L.drain = () => {
    const n = count;
    count = 0;
    const inset = getInset();
    queue[0] = inset[0]; queue[1] = inset[1]; queue[2] = inset[2]; queue[3] = inset[3];
    queue[4] = dark.matches ? 1 : 0;
    queue[5] = performance.now();
    queue[6] = stored ? 1 : 0;
    stored = false;
    return n;
  };
  // texts hands over the strings of the events just drained; files stay until read.
  L.texts = () => { const s = strings; strings = []; return s; };
  L.file = i => { const f = files[i]; files[i] = null; if (files.every(x => !x)) files = []; return f; };

  // Safe-area insets, read again only after a change of size.
  let insets = null;
  const getInset = () => {
    if (insets) return insets;
    try {
      const s = getComputedStyle(byId('levelspan-inset'));
      insets = [s.paddingTop, s.paddingRight, s.paddingBottom, s.paddingLeft].map(x => parseFloat(x) || 0);
    } catch (e) { insets = [0, 0, 0, 0]; }
    return insets;
  };
  addEventListener('resize', e => {
    insets = null;
    if (!left) { L.wake(); return; }
    e.stopImmediatePropagation();                       // the drawing library would draw once more
    L.wake();
  }, true);

  // What outlives the page. The answer is a word and values: ok, none, full, or why not.
  let stored = false;
  addEventListener('storage', () => { stored = true; L.wake(); });
  L.store = (area, what, key, value) => {
    try {
      const s = window[area];
      switch (what) {
        case 'get': { const v = s.getItem(key); return v === null ? ['none'] : ['ok', v]; }
        case 'set': s.setItem(key, value); return ['ok'];
        case 'remove': s.removeItem(key); return ['ok'];
        default: return ['ok', ...Object.keys(s)];
      }
    } catch (e) { return [/quota/i.test(e && e.name) ? 'full' : String(e && e.message || 'refused')]; }
  };
  L.paste = () => {
    const no = e => L.push(L.PASTE, {value: -1, text: 'The browser did not let the program read the clipboard: ' + (e && e.message)});
    try { navigator.clipboard.readText().then(t => L.push(L.PASTE, {text: t}), no); } catch (e) { no(e); }
  };
  L.canshare = () => typeof navigator.share === 'function';
  L.share = (title, said, link, name, mime, content) => {
    const no = e => { if (e.name !== 'AbortError') L.push(L.FAILURE, {text: 'Not shared: ' + e.message}); };
    try {
      const data = {title, text: said};
      if (link) data.url = link;
      if (name && navigator.canShare) {
        const files = [new File([content], name, {type: mime})];
        if (navigator.canShare({files})) data.files = files;
      }
      navigator.share(data).catch(no);
    } catch (e) { no(e); }
  };

  // Clipboard, with the text always left in the mirror, and shown where the browser refuses.
  L.copy = (what, value) => {
    byId('levelspan-copied').textContent = value;
    const done = () => L.push(L.NOTICE, {text: what + ' copied'});
    const byHand = () => { if (byCommand(value)) done(); else showCopy(value); };
    try { navigator.clipboard.writeText(value).then(done, byHand); } catch (e) { byHand(); }
  };
  const byCommand = value => {
    const back = document.activeElement;
    const area = document.createElement('textarea');
    try {
      area.value = value;
      area.readOnly = true;
      area.style.position = 'fixed';
      area.style.opacity = '0';
      document.body.append(area);
      area.select();
      area.setSelectionRange(0, value.length);
      return document.execCommand('copy');
    } catch (e) { return false; } finally {
      area.remove();
      if (back && back.focus) back.focus({preventScroll: true});
    }
  };
  const showCopy = value => {
    const box = byId('levelspan-copy'), area = box.querySelector('textarea'), back = document.activeElement;
    area.value = value;
    box.hidden = false;
    area.focus();
    area.select();
    const close = () => { box.hidden = true; if (back && back.focus) back.focus({preventScroll: true}); };
    box.querySelector('button').onclick = close;
    box.onkeydown = e => { if (e.key === 'Escape') close(); };
  };

  // Files in: the picker and drops. Out: a download, or the share sheet where a home-screen app has no downloads.
  const LARGEST = 4 << 20;
  const take = file => {
    const bad = why => L.push(L.FILE, {id: file.name, text: why, value: -1});
    if (file.size > LARGEST) { bad('larger than 4 MB: not a case file'); return; }
    const reader = new FileReader();
    reader.onload = () => L.push(L.FILE, {id: file.name, value: files.push(new Uint8Array(reader.result)) - 1});
    reader.onerror = () => bad('the browser could not read it');
    reader.readAsArrayBuffer(file);
  };
  L.pick = () => {
    try {
      const input = document.createElement('input');
      input.type = 'file';
      input.accept = '.json,application/json';
      input.onchange = () => { if (input.files[0]) take(input.files[0]); };
      input.click();
    } catch (e) { L.push(L.FAILURE, {text: 'The browser did not open its file picker: ' + e.message}); }
  };
  addEventListener('dragover', e => e.preventDefault());
  addEventListener('drop', e => {
    e.preventDefault();
    if (e.dataTransfer && e.dataTransfer.files[0]) take(e.dataTransfer.files[0]);
  });
  L.save = (name, mime, bytes) => {
    const copy = bytes.slice(), said = () => L.push(L.NOTICE, {text: name + ' saved'});
    const failed = e => L.push(L.FAILURE, {text: 'Not saved: ' + e.message + '. Share the case as a link instead.'});
    try {
      if (navigator.standalone && navigator.canShare) {
        const file = new File([copy], name, {type: mime});
        if (navigator.canShare({files: [file]})) {
          navigator.share({files: [file]}).then(said, e => { if (e.name !== 'AbortError') failed(e); });
          return;
        }
      }
      const url = URL.createObjectURL(new Blob([copy], {type: mime}));
      const a = document.createElement('a');
      a.href = url;
      a.download = name;
      a.hidden = true;
      document.body.append(a);
      a.click();
      a.remove();
      setTimeout(() => URL.revokeObjectURL(url), 60000);
      said();
    } catch (e) { failed(e); }
  };

  // The case as last committed, for the day that the program stops: whether or not it could be kept.
  let lastCase = '';
  L.hold = text => { lastCase = text; };

  // The heartbeat. Who asks for a frame is owed an answer; without one for three seconds of a page that is shown and gets
  // its turns, the program has stopped. A page that is hidden, a machine that sleeps and a debugger that halts do not
  // count: then the turns come late or not at all. Nothing runs while nothing is owed.
  const TURN = 500, TURNS = 6;
  let owed = false, watched = false, answers = 0;
  L.owe = () => {
    owed = true;
    if (watched || document.documentElement.dataset.ready !== 'true') return;
    watched = true;
    let missed = 0, last = performance.now(), seen = answers;
    const turn = () => {
      if (!owed || L.dead) { watched = false; return; }
      const now = performance.now();
      if (document.hidden || now - last > 3 * TURN || answers !== seen) missed = 0; else missed++;
      last = now;
      seen = answers;
      if (missed >= TURNS) L.fail('The program has not answered for ' + TURN * TURNS / 1000 + ' seconds.');
      else raf(() => setTimeout(turn, TURN));
    };
    setTimeout(turn, TURN);
  };
  L.beat = () => { owed = false; answers++; };

  // Links.
  L.base = () => { try { return location.href.replace(/#.*$/, ''); } catch (e) { return ''; } };
  const followHash = () => { if (/^#case=/.test(location.hash)) L.push(L.LINK, {text: location.hash}); };
  addEventListener('hashchange', followHash);
  followHash();

  // The end: cover everything, so that no figure stays readable.
  L.fail = why => {
    if (L.dead) return;
    L.dead = true;
    const box = byId('levelspan-stop');
    box.querySelector('pre').textContent = why + (L.log ? '\n\n' + L.log : '');
    box.querySelector('button').onclick = () => location.reload();
    const saved = box.querySelector('textarea');
    saved.value = lastCase;
    saved.parentNode.hidden = !lastCase;
    const copy = saved.parentNode.querySelector('button');
    copy.onclick = () => {
      const by = ok => { copy.textContent = ok ? 'Copied' : 'Select the text and copy it'; if (!ok) saved.select(); };
      try { navigator.clipboard.writeText(lastCase).then(() => by(true), () => by(byCommand(lastCase))); } catch (e) { by(byCommand(lastCase)); }
    };
    for (const id of ['levelspan-summary', 'levelspan-warnings', 'levelspan-status', 'levelspan-facts']) byId(id).replaceChildren();
    byId('levelspan-limits').tBodies[0].replaceChildren();
    for (const c of document.querySelectorAll('canvas')) c.style.visibility = 'hidden';
    for (const id of ['levelspan-page', 'levelspan-shell', 'levelspan-copy']) byId(id).hidden = true;
    document.documentElement.removeAttribute('data-ready');
    box.hidden = false;
    box.querySelector('button').focus();
  };
  addEventListener('error', e => {
    if (/^ResizeObserver loop/.test(e.message)) return; // a late layout, not a fault
    L.fail(e.message || 'an error without a message');
  });
  addEventListener('unhandledrejection', e => L.fail(String(e.reason)));

  // The drawing library reloads the page when the graphics context is lost, even one that has been left, and with it goes
  // the work: it is not told.
  const listen = EventTarget.prototype.addEventListener;
  HTMLCanvasElement.prototype.addEventListener = function (type, ...more) {
    if (type !== 'webglcontextlost') listen.call(this, type, ...more);
  };
  addEventListener('webglcontextlost', e => {
    if (!e.target.isConnected) return;
    e.preventDefault();
    L.lose();
  }, true);

  // adopt tidies up after the drawing library's start: its canvas is out of the way of focus and of screen readers,
  // the page's own viewport counts, and a change of size that sends no event still arrives.
  L.adopt = () => {
    window.requestAnimationFrame = raf;
    for (const c of document.querySelectorAll('body>canvas')) {
      c.removeAttribute('tabindex');
      c.setAttribute('aria-hidden', 'true');
    }
    const metas = document.querySelectorAll('meta[name=viewport]');
    for (let i = 1; i < metas.length; i++) metas[i].remove();
    let w = innerWidth, h = innerHeight;
    addEventListener('resize', () => { w = document.body.clientWidth; h = document.body.clientHeight; }, true);
    const look = () => {
      if (document.body.clientWidth !== w || document.body.clientHeight !== h) dispatchEvent(new Event('resize'));
    };
    if (window.ResizeObserver) new ResizeObserver(look).observe(document.body);
    if (window.visualViewport) visualViewport.addEventListener('resize', look);
  };

  // ready says that the first chart has been drawn; it is on screen with the browser's next frame.
  L.ready = surface => {
    byId('levelspan-page').hidden = false;
    requestAnimationFrame(() => {
      if (L.dead) return;
      byId('levelspan-shell').hidden = true;
      document.documentElement.dataset.surface = surface;
      document.documentElement.dataset.ready = 'true';
      try { performance.mark('levelspan-first-chart'); } catch (e) { /* the mark is for measuring only */ }
    });
  };
})();

'use strict';
// Probe, unpack, start. Runs last; levelspan and Go are there already.
(async () => {
  const L = globalThis.levelspan;
  const byId = id => document.getElementById(id);
  const root = document.documentElement;
  const says = text => { byId('levelspan-state').textContent = text; };
  const bar = part => { byId('levelspan-progress').value = part; };
  const breathe = () => new Promise(done => setTimeout(done, 0));
  const problem = (title, ...lines) => {
    const box = byId('levelspan-problem');
    const h = document.createElement('h2');
    h.textContent = title;
    box.replaceChildren(h, ...lines.map(t => { const p = document.createElement('p'); p.textContent = t; return p; }));
    box.hidden = false;
    byId('levelspan-load').hidden = true;
    root.dataset.problem = title;
  };
  const otherwise = 'The command levelspan limits CASE.json and the desktop window give the same figures without a browser.';

  // What this browser has.
  const asked = new URLSearchParams(location.search).get('surface');
  if (typeof WebAssembly !== 'object') {
    problem('This browser runs no WebAssembly', 'levelspan is a WebAssembly program. Browsers leave it out in lockdown or enhanced-security modes; ' +
      'switch that off for this page, or use another browser.', otherwise);
    return;
  }
  // WebGL2 counts only where it is hardware: drawn by the processor it is far slower than the software surface.
  const probe = () => {
    try {
      const g = document.createElement('canvas').getContext('webgl2', {failIfMajorPerformanceCaveat: true});
      if (!g) return false;
      const names = g.getExtension('WEBGL_debug_renderer_info');
      const name = String(g.getParameter(names ? names.UNMASKED_RENDERER_WEBGL : g.RENDERER));
      const x = g.getExtension('WEBGL_lose_context');
      if (x) x.loseContext();
      return !/swiftshader|llvmpipe|softpipe|software|basic render/i.test(name);
    } catch (e) { return false; }
  };
  const surface = asked === 'software' || asked === 'webgl' ? asked : probe() ? 'webgl' : 'software';

  // Device pixels a logical pixel: no more than the glyphs are made for, and no larger a picture than a tablet's memory
  // bears. The drawing library reads it once; when it changes, the software surface goes on.
  const own = Object.getOwnPropertyDescriptor(window, 'devicePixelRatio');
  const real = () => (own && own.get ? own.get.call(window) : 0) || 1;
  const ratio = () => {
    const longest = Math.max(screen.width, screen.height, innerWidth, innerHeight);
    return Math.min(real(), 3, Math.max(longest * 2 > 4096 ? 1 : 2, 2600 / longest));
  };
  if (own && own.get) Object.defineProperty(window, 'devicePixelRatio', {configurable: true, get: ratio});
  // Browsers tell of a change by the media query, most by a change of size too, some only when the window is looked at again.
  let seen = real();
  const look = () => {
    if (real() === seen) return;
    seen = real();
    L.resized();
    watch();
  };
  const watch = () => {
    if (!window.matchMedia) return;
    const now = matchMedia('(resolution: ' + seen + 'dppx)');
    if (now.addEventListener) now.addEventListener('change', look, {once: true});
  };
  for (const t of ['resize', 'focus', 'pageshow']) addEventListener(t, look, true);
  document.addEventListener('visibilitychange', look);
  watch();

  // The drawing library asks for a context with the browser's defaults. The drawing smooths its own edges and covers all
  // of its canvas: many samples a pixel and a blend with the page below would cost much and show nothing.
  // And it takes every answer for granted: no context is said as null, a context that is lost already is none, and one that is
  // lost later answers in numbers until it is left.
  const plain = HTMLCanvasElement.prototype.getContext;
  HTMLCanvasElement.prototype.getContext = function (kind, options, ...more) {
    if (kind !== 'webgl2') return plain.call(this, kind, options, ...more);
    let g = null;
    try { g = plain.call(this, kind, Object.assign({}, options, {antialias: false, alpha: false, depth: false}), ...more); } catch (e) { /* none */ }
    if (!g || g.isContextLost()) return null;
    for (const [name, instead] of [['getParameter', 4096], ['getProgramParameter', true]]) {
      const ask = g[name];
      if (Object.hasOwn(g, name)) continue;
      g[name] = (...a) => { const v = ask.apply(g, a); return v === null && g.isContextLost() ? instead : v; };
    }
    return g;
  };

  // The program's bytes: inside this page, or beside it.
  const inline = byId('levelspan-program');
  const inflate = async (packed, size) => {
    if (typeof DecompressionStream !== 'function') throw new Error('the browser has no DecompressionStream (too old)');
    const reader = new Blob([packed]).stream().pipeThrough(new DecompressionStream('gzip')).getReader();
    const bytes = new Uint8Array(size);
    for (let at = 0; ;) {
      const {done, value} = await reader.read();
      if (done) { if (at !== size) throw new Error('the program is damaged: ' + at + ' of ' + size + ' bytes'); return bytes; }
      bytes.set(value, at);
      at += value.length;
      bar(0.2 + 0.5 * at / size);
    }
  };
  const decode = text => {
    if (Uint8Array.fromBase64) return Uint8Array.fromBase64(text);
    const s = atob(text), bytes = new Uint8Array(s.length);
    for (let i = 0; i < s.length; i++) bytes[i] = s.charCodeAt(i);
    return bytes;
  };
  const fromPage = async imports => {
    says('Unpacking the program');
    await breathe();
    const packed = decode(inline.textContent.trim()), size = +inline.dataset.size;
    inline.remove();
    bar(0.2);
    const bytes = await inflate(packed, size);
    says('Starting the program');
    await breathe();
    return (await WebAssembly.instantiate(bytes, imports)).instance;
  };
  const fromSite = async imports => {
    const link = byId('levelspan-source'), size = +link.dataset.size;
    const answer = await fetch(link.dataset.href);
    if (!answer.ok) throw new Error('the server answered ' + answer.status);
    let at = 0;
    const count = new TransformStream({transform(chunk, to) { at += chunk.length; bar(0.8 * at / size); to.enqueue(chunk); }});
    const counted = new Response(answer.body.pipeThrough(count), {headers: {'content-type': 'application/wasm'}});
    if (WebAssembly.instantiateStreaming) return (await WebAssembly.instantiateStreaming(counted, imports)).instance;
    return (await WebAssembly.instantiate(await counted.arrayBuffer(), imports)).instance;
  };

  // What the program prints before it dies is kept for the message.
  const write = globalThis.fs.writeSync, words = new TextDecoder();
  globalThis.fs.writeSync = (fd, bytes) => {
    L.log += words.decode(bytes);
    if (L.log.length > 8192) L.log = L.log.slice(0, 3072) + '\n[...]\n' + L.log.slice(-4096); // the cause stands first
    return write.call(globalThis.fs, fd, bytes);
  };
  const go = new Go();
  go.argv = ['levelspan', root.dataset.version];
  go.env = {GOGC: '300', SURFACE: surface};
  const gojs = go.importObject.gojs, schedule = gojs['runtime.scheduleTimeoutEvent'], set = globalThis.setTimeout;
  gojs['runtime.scheduleTimeoutEvent'] = sp => {
    globalThis.setTimeout = (f, ms) => set(f, L.patience(ms));
    try { schedule(sp); } finally { globalThis.setTimeout = set; }
  };
  go.exit = code => L.fail('The program ended with code ' + code + '.');
  try {
    const instance = await (inline ? fromPage : fromSite)(go.importObject);
    bar(0.85);
    says('Starting the program');
    await breathe();
    L.park();
    go.run(instance).then(() => L.fail('The program ended.'), e => L.fail(String(e)));
  } catch (e) {
    problem('The program did not load', String(e.message || e), 'Reload the page. If that does not help, download it again.', otherwise);
  }
})();

'use strict';
// The mirror: real elements that say what is drawn, kept by patches from the program. Text and attributes only;
// nothing is ever read as markup. Records end with U+001E, fields with U+001F. See wasm/mirror.go.
(() => {
  const L = globalThis.levelspan;
  const byId = id => document.getElementById(id);
  const layer = byId('levelspan-layer');
  const body = document.querySelector('#levelspan-limits tbody');
  const facts = byId('levelspan-facts');
  const controls = new Map(), rows = new Map(), terms = new Map();
  let busy = false;                                     // our own doing: not a move of the focus by the person

  const TAGS = {button: 'button', slider: 'div', input: 'input', region: 'div'};
  const create = (id, tag) => {
    const el = document.createElement(TAGS[tag] || 'div');
    el.dataset.control = id;
    if (tag === 'button') el.type = 'button';
    if (tag === 'slider') {
      el.setAttribute('role', 'slider');
      if (id.startsWith('handle/')) el.dataset.handle = id.slice(7);
    }
    if (tag === 'input') {
      el.type = 'text';
      el.autocomplete = 'off';
      el.spellcheck = false;
      el.maxLength = 500;
      el.addEventListener('input', () => L.push(L.TEXT, {id, text: el.value}));
    }
    if (tag === 'region') el.dataset.region = '';
    controls.set(id, el);
    return el;
  };

  // order puts the elements in the order of the drawing; a run of tabs or radios goes into a group of its kind.
  const order = list => {
    const had = document.activeElement;
    let parent = layer, next = layer.firstChild;
    const put = (where, el, before) => { if (el !== before) where.insertBefore(el, before); return el.nextSibling; };
    for (const item of list) {
      if (item[0] === '<') {                            // "<tablist name": a group begins
        const [kind, ...name] = item.slice(1).split(' ');
        let box = next;
        if (!box || box.dataset.control !== undefined || box.getAttribute('role') !== kind) {
          box = document.createElement('div');
          box.setAttribute('role', kind);
          layer.insertBefore(box, next);
        }
        if (name.length) box.setAttribute('aria-label', name.join(' '));
        parent = box;
        next = box.firstChild;
      } else if (item === '>') {                        // and ends
        while (next) { const n = next.nextSibling; next.remove(); next = n; }
        next = parent.nextSibling;
        parent = layer;
      } else {
        const el = controls.get(item);
        if (el) next = put(parent, el, next);
      }
    }
    while (next) { const n = next.nextSibling; next.remove(); next = n; }
    if (had && had !== document.activeElement && had.isConnected) had.focus({preventScroll: true});
  };

  const cell = (tr, i) => tr.children[i];
  const row = (key, f) => {
    let tr = rows.get(key);
    if (!tr) {
      tr = document.createElement('tr');
      tr.dataset.key = key;
      const th = document.createElement('th');
      th.scope = 'row';
      tr.append(th);
      for (let i = 0; i < 4; i++) tr.append(document.createElement('td'));
      rows.set(key, tr);
      body.append(tr);
    }
    for (let i = 0; i < 5; i++) if (cell(tr, i).textContent !== f[i]) cell(tr, i).textContent = f[i];
    const value = cell(tr, 2);
    ['casMps', 'tasMps', 'iasMps', 'low', 'high'].forEach((name, i) => {
      if (f[5 + i] === '') delete value.dataset[name]; else value.dataset[name] = f[5 + i];
    });
    if (f[10] === '1') tr.setAttribute('aria-current', 'true'); else tr.removeAttribute('aria-current');
  };
  const fact = (key, name, said, value) => {
    let box = terms.get(key);
    if (!box) {
      box = document.createElement('div');
      box.dataset.key = key;
      box.append(document.createElement('dt'), document.createElement('dd'));
      terms.set(key, box);
      facts.append(box);
    }
    box.firstChild.textContent = name;
    box.lastChild.textContent = said;
    box.dataset.value = value;
  };
  const keep = (map, parent, keys) => {                 // exactly these, in this order
    const wanted = new Set(keys);
    for (const [k, el] of map) if (!wanted.has(k)) { el.remove(); map.delete(k); }
    let next = parent.firstChild;
    for (const k of keys) { const el = map.get(k); if (el !== next) parent.insertBefore(el, next); else next = next.nextSibling; }
  };

  // Live regions speak after half a second in which nothing was done and nothing drawn changed, and only what is new.
  const waiting = new Map();
  let speaking = 0;
  const announce = (id, said) => waiting.set(id, said);
  const speakLater = () => {
    if (!waiting.size) return;
    clearTimeout(speaking);
    speaking = setTimeout(() => {
      if (L.dead) return;
      for (const [id, said] of waiting) { const el = byId(id); if (el.textContent !== said) el.textContent = said; }
      waiting.clear();
    }, 500);
  };
  L.hush = speakLater;

  const ALLOWED = /^(aria-[a-z]+|disabled|inert|tabindex|data-[a-z-]+|role)$/;
  const DO = {
    '+': f => create(f[0], f[1]),
    '-': f => { const el = controls.get(f[0]); if (el) { el.remove(); controls.delete(f[0]); } },
    'a': f => { const el = controls.get(f[0]); if (el && ALLOWED.test(f[1])) el.setAttribute(f[1], f[2]); },
    'x': f => { const el = controls.get(f[0]); if (el) el.removeAttribute(f[1]); },
    'p': f => {
      const el = controls.get(f[0]);
      if (!el) return;
      el.style.transform = 'translate(' + f[1] + 'px,' + f[2] + 'px)';
      el.style.width = f[3] + 'px';
      el.style.height = f[4] + 'px';
    },
    'v': f => { const el = controls.get(f[0]); if (el && el.value !== f[1] && document.activeElement !== el) el.value = f[1]; },
    'o': f => order(f),
    'r': f => row(f[0], f.slice(1)),
    'R': f => keep(rows, body, f),
    'f': f => fact(f[0], f[1], f[2], f[3]),
    'F': f => keep(terms, facts, f),
    't': f => { const el = byId('levelspan-' + f[0]); if (el) el.textContent = f[1]; },
    'c': f => {
      document.documentElement.dataset.palette = f[0];
      document.documentElement.style.setProperty('--ground', f[1]);
    },
    'T': f => { document.title = f[0]; },
    'l': f => announce('levelspan-' + f[0], f[1]),
  };
  L.patch = text => {
    busy = true;
    try {
      for (const record of text.split('\u001e')) {
        if (!record) continue;
        const f = record.split('\u001f');
        DO[f[0]](f.slice(1));
      }
    } catch (e) { L.fail('The mirror of the drawing failed: ' + e.message); } finally { busy = false; }
    speakLater();
    enter();
  };

  // enter moves the focus into a dialog that has opened over the element that had it.
  const enter = () => {
    const now = document.activeElement;
    if (!layer.querySelector('[inert]') || now && now !== document.body && !now.closest('[inert]')) return;
    const first = layer.querySelector('[data-control][tabindex="0"]:not([inert])');
    if (first) first.focus({preventScroll: true});
  };

  // The focus: the program's word is carried out; the person's move (Tab, a screen reader) is told to the program.
  L.focus = id => {
    busy = true;
    try {
      const el = controls.get(id), now = document.activeElement;
      if (el && el !== now) el.focus({preventScroll: true});
      else if (!el && now && layer.contains(now)) now.blur();
    } catch (e) { /* an element that cannot take the focus keeps none */ } finally { busy = false; }
  };
  layer.addEventListener('focusin', e => {
    const el = e.target.closest('[data-control]');
    if (!busy && el) L.push(L.FOCUS, {id: el.dataset.control});
  });
  layer.addEventListener('focusout', e => {
    if (!busy && document.hasFocus() && !(e.relatedTarget && layer.contains(e.relatedTarget))) L.push(L.FOCUS, {id: ''});
  });
})();

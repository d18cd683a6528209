//go:build !js

package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/chromedp"
)

// TestSingleFileNeedsNothing opens the page in one file with the network off and with everything that a browser may
// refuse throwing: it draws on either surface, follows a drag, gives its link, and asks for nothing.
func TestSingleFileNeedsNothing(t *testing.T) {
	for _, surface := range []string{"", "?surface=webgl"} {
		b := newTab(t, 1000, 700, 1, false)
		_, err := chromedp.Call(b.ctx, network.EmulateNetworkConditionsByRule, network.EmulateNetworkConditionsByRuleParams{
			MatchedNetworkConditions: []*network.Conditions{{Offline: true, DownloadThroughput: -1, UploadThroughput: -1}}})
		b.check(err)
		_, err = chromedp.Call(b.ctx, network.OverrideNetworkState, network.OverrideNetworkStateParams{Offline: true})
		b.check(err)
		b.before(`globalThis.tried = [];
			const refuse = k => ({get() { tried.push(k); throw new DOMException('refused', 'SecurityError'); }});
			for (const k of ['localStorage', 'sessionStorage', 'indexedDB', 'caches']) Object.defineProperty(window, k, refuse(k));
			Object.defineProperty(navigator, 'serviceWorker', refuse('serviceWorker'));
			for (const k of ['fetch', 'XMLHttpRequest', 'WebSocket', 'EventSource', 'Worker']) window[k] = function () { tried.push(k); throw new Error('no network'); };
			navigator.sendBeacon = () => { tried.push('sendBeacon'); return false; };
			addEventListener('securitypolicyviolation', e => tried.push('policy: ' + e.effectiveDirective));`)
		address := singleFile(t) + surface
		b.open(address)
		if eval[bool](b, "navigator.onLine") {
			t.Error("the browser thinks that there is a network")
		}
		mass := b.handle("mass")
		x, y := b.control("handle/mass").middle()
		b.dragMouse(x, y, x-60, y, 5)
		if b.handle("mass") >= mass {
			t.Error("the handle does not follow")
		}
		b.agree("a drag with nothing to be had") // by the link that the page copies
		b.mu.Lock()
		for _, r := range b.requests {
			if r != address && !strings.HasPrefix(r, "data:") {
				t.Errorf("the page asked for %s", r)
			}
		}
		b.mu.Unlock()
		for _, k := range strings.Fields(eval[string](b, "tried.join(' ')")) {
			if !strings.HasSuffix(k, "Storage") {
				t.Errorf("the page tried %s", k)
			}
		}
		if eval[bool](b, "!!document.getElementById('levelspan-offer') || !!document.querySelector('link[rel=manifest]')") {
			t.Error("the page in one file has an offer or a manifest")
		}
	}
}

// The hosted page has no connection but to its own server, and nothing to run but its own files.
func TestSitePolicy(t *testing.T) {
	data, err := os.ReadFile(filepath.Join(buildAll(t), "dist", "site", "index.html"))
	if err != nil {
		t.Fatal(err)
	}
	_, policy, _ := strings.Cut(string(data), `Content-Security-Policy" content="`)
	policy, _, _ = strings.Cut(policy, `"`)
	for _, part := range strings.Split(strings.ReplaceAll(policy, "&#39;", "'"), ";") {
		for _, word := range strings.Fields(part)[1:] {
			switch word {
			case "'none'", "'self'", "data:", "'wasm-unsafe-eval'":
			default:
				t.Errorf("the policy allows %s", part)
			}
		}
	}
	if !strings.HasPrefix(policy, "default-src &#39;none&#39;") {
		t.Errorf("policy %s", policy)
	}
}

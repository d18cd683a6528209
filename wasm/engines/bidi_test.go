package engines

import (
	"bufio"
	"crypto/rand"
	"crypto/sha1"
	"encoding/base64"
	"encoding/binary"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"net"
	"net/http"
	"os"
	"path/filepath"
	"regexp"
	"sync"
	"testing"
	"time"
)

// socket is the client's end of a WebSocket (RFC 6455), as far as a driver needs it: whole text messages.
type socket struct {
	conn net.Conn
	in   *bufio.Reader
	mu   sync.Mutex
}

// dial opens one.
func dial(address, path string) (*socket, error) {
	conn, err := net.Dial("tcp", address)
	if err != nil {
		return nil, err
	}
	var nonce [16]byte
	rand.Read(nonce[:])
	key := base64.StdEncoding.EncodeToString(nonce[:])
	fmt.Fprintf(conn, "GET %s HTTP/1.1\r\nHost: %s\r\nUpgrade: websocket\r\nConnection: Upgrade\r\nSec-WebSocket-Key: %s\r\nSec-WebSocket-Version: 13\r\n\r\n", path, address, key)
	in := bufio.NewReader(conn)
	answer, err := http.ReadResponse(in, nil)
	if err != nil {
		conn.Close()
		return nil, err
	}
	sum := sha1.Sum([]byte(key + "258EAFA5-E914-47DA-95CA-C5AB0DC85B11"))
	if answer.StatusCode != http.StatusSwitchingProtocols || answer.Header.Get("Sec-WebSocket-Accept") != base64.StdEncoding.EncodeToString(sum[:]) {
		conn.Close()
		return nil, fmt.Errorf("the server does not switch: %s", answer.Status)
	}
	return &socket{conn: conn, in: in}, nil
}

// The opcodes that matter.
const (
	opText  = 1
	opClose = 8
	opPing  = 9
	opPong  = 10
)

func (s *socket) send(op byte, data []byte) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	frame := []byte{0x80 | op}
	switch n := len(data); {
	case n < 126:
		frame = append(frame, 0x80|byte(n))
	case n < 1<<16:
		frame = binary.BigEndian.AppendUint16(append(frame, 0x80|126), uint16(n))
	default:
		frame = binary.BigEndian.AppendUint64(append(frame, 0x80|127), uint64(n))
	}
	var mask [4]byte
	rand.Read(mask[:])
	frame = append(frame, mask[:]...)
	for i, b := range data {
		frame = append(frame, b^mask[i%4])
	}
	_, err := s.conn.Write(frame)
	return err
}

// receive gives the next message.
func (s *socket) receive() ([]byte, error) {
	var message []byte
	for {
		var head [2]byte
		if _, err := io.ReadFull(s.in, head[:]); err != nil {
			return nil, err
		}
		n := uint64(head[1] & 0x7f)
		switch n {
		case 126:
			var b [2]byte
			if _, err := io.ReadFull(s.in, b[:]); err != nil {
				return nil, err
			}
			n = uint64(binary.BigEndian.Uint16(b[:]))
		case 127:
			var b [8]byte
			if _, err := io.ReadFull(s.in, b[:]); err != nil {
				return nil, err
			}
			n = binary.BigEndian.Uint64(b[:])
		}
		if n > 1<<28 {
			return nil, errors.New("a frame of more than 256 MB")
		}
		data := make([]byte, n)
		if _, err := io.ReadFull(s.in, data); err != nil {
			return nil, err
		}
		switch head[0] & 15 {
		case opClose:
			return nil, fmt.Errorf("closed: %q", data)
		case opPing:
			s.send(opPong, data)
			continue
		case opPong:
			continue
		}
		message = append(message, data...)
		if head[0]&0x80 != 0 {
			return message, nil
		}
	}
}

// biDi is an engine behind WebDriver BiDi (W3C).
type biDi struct {
	socket  *socket
	context string
	mu      sync.Mutex
	next    int
	waiting map[int]chan json.RawMessage
	gone    error
	said    []string // errors on the page's console
}

// preferences of the profile: the browser asks nothing of its maker's servers.
const preferences = `user_pref("app.normandy.enabled", false);
user_pref("browser.backup.enabled", false);
user_pref("browser.safebrowsing.update.enabled", false);
user_pref("datareporting.healthreport.uploadEnabled", false);
user_pref("extensions.update.enabled", false);
user_pref("network.captive-portal-service.enabled", false);
user_pref("network.connectivity-service.enabled", false);
user_pref("services.settings.server", "data:,");
`

// newBiDi starts Firefox with a profile of its own and opens a session.
func newBiDi(t *testing.T, path string) *biDi {
	t.Helper()
	profile := t.TempDir()
	if err := os.WriteFile(filepath.Join(profile, "user.js"), []byte(preferences), 0o644); err != nil {
		t.Fatal(err)
	}
	// Begun with an empty page, the browser leaves the focus in its address bar, and no element hears of its own.
	said := start(t, []string{"MOZ_HEADLESS=1"}, path, "--headless", "--no-remote", "--remote-debugging-port", "0", "--profile", profile, "data:text/html,<title>levelspan</title>")
	listens := regexp.MustCompile(`WebDriver BiDi listening on ws://([0-9.:a-z]+)`)
	d := &biDi{waiting: map[int]chan json.RawMessage{}}
	for end := time.Now().Add(60 * time.Second); ; time.Sleep(50 * time.Millisecond) {
		if found := listens.FindStringSubmatch(said.String()); found != nil {
			var err error
			if d.socket, err = dial(found[1], "/session"); err != nil {
				t.Fatal(err)
			}
			break
		}
		if time.Now().After(end) {
			t.Fatalf("Firefox does not listen: %s", said.tail())
		}
	}
	go d.read()
	var tree struct{ Contexts []struct{ Context string } }
	for _, c := range []struct {
		method string
		params any
		into   any
	}{
		{"session.new", map[string]any{"capabilities": map[string]any{}}, nil},
		{"session.subscribe", map[string]any{"events": []string{"log.entryAdded"}}, nil},
		{"browsingContext.getTree", map[string]any{}, &tree},
	} {
		if err := d.call(c.method, c.params, c.into); err != nil {
			t.Fatal(err)
		}
	}
	if len(tree.Contexts) == 0 {
		t.Fatal("Firefox has no window")
	}
	d.context = tree.Contexts[0].Context
	t.Cleanup(d.close)
	return d
}

func (d *biDi) read() {
	for {
		text, err := d.socket.receive()
		if err != nil {
			d.mu.Lock()
			d.gone = err
			for id, c := range d.waiting {
				close(c)
				delete(d.waiting, id)
			}
			d.mu.Unlock()
			return
		}
		var m struct {
			ID     *int
			Method string
			Params struct{ Level, Text string }
		}
		if json.Unmarshal(text, &m) != nil {
			continue
		}
		d.mu.Lock()
		if m.ID != nil {
			if c := d.waiting[*m.ID]; c != nil {
				c <- text
				delete(d.waiting, *m.ID)
			}
		} else if m.Method == "log.entryAdded" && m.Params.Level == "error" {
			d.said = append(d.said, m.Params.Text)
		}
		d.mu.Unlock()
	}
}

func (d *biDi) call(method string, params, into any) error {
	d.mu.Lock()
	d.next++
	id, c := d.next, make(chan json.RawMessage, 1)
	d.waiting[id] = c
	d.mu.Unlock()
	text, err := json.Marshal(map[string]any{"id": id, "method": method, "params": params})
	if err != nil {
		return err
	}
	if err := d.socket.send(opText, text); err != nil {
		return err
	}
	select {
	case answer, ok := <-c:
		if !ok {
			return fmt.Errorf("%s: the browser has gone: %w", method, d.gone)
		}
		var m struct {
			Type, Error, Message string
			Result               json.RawMessage
		}
		if err := json.Unmarshal(answer, &m); err != nil {
			return err
		}
		if m.Type == "error" {
			return fmt.Errorf("%s: %s: %s", method, m.Error, m.Message)
		}
		if into == nil {
			return nil
		}
		return json.Unmarshal(m.Result, into)
	case <-time.After(60 * time.Second):
		return fmt.Errorf("%s: no answer for a minute", method)
	}
}

func (d *biDi) open(address string) error {
	return d.call("browsingContext.navigate", map[string]any{"context": d.context, "url": address, "wait": "complete"}, nil)
}

func (d *biDi) eval(expression string) (string, error) {
	var r struct {
		Type   string
		Result struct {
			Type  string
			Value json.RawMessage
		}
		ExceptionDetails json.RawMessage
	}
	err := d.call("script.evaluate", map[string]any{"expression": expression, "target": map[string]any{"context": d.context}, "awaitPromise": true}, &r)
	if err != nil {
		return "", err
	}
	if r.Type != "success" {
		return "", fmt.Errorf("%.200s: %.400s", expression, r.ExceptionDetails)
	}
	var value string
	if err := json.Unmarshal(r.Result.Value, &value); err != nil {
		return "", fmt.Errorf("%.200s gives no text but %s %.100s", expression, r.Result.Type, r.Result.Value)
	}
	return value, nil
}

func (d *biDi) act(sources []any) error {
	return d.call("input.performActions", map[string]any{"context": d.context, "actions": sources}, nil)
}

func (d *biDi) size(width, height int) error {
	return d.call("browsingContext.setViewport", map[string]any{"context": d.context, "viewport": map[string]any{"width": width, "height": height}}, nil)
}

func (d *biDi) picture() ([]byte, error) {
	var r struct{ Data string }
	if err := d.call("browsingContext.captureScreenshot", map[string]any{"context": d.context}, &r); err != nil {
		return nil, err
	}
	return base64.StdEncoding.DecodeString(r.Data)
}

func (d *biDi) reload() error {
	return d.call("browsingContext.reload", map[string]any{"context": d.context, "wait": "complete"}, nil)
}

func (d *biDi) console() (said []string, err error) {
	d.mu.Lock()
	defer d.mu.Unlock()
	said, d.said = d.said, nil
	return said, nil
}

func (d *biDi) close() { d.socket.conn.Close() }

package keep

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"
)

func TestFilesInANewFolder(t *testing.T) {
	folder := filepath.Join(t.TempDir(), "levelspan", "cases")
	s := NewFiles(folder)
	if list, err := s.List(); err != nil || len(list) != 0 {
		t.Fatalf("a folder that is not there: %v, %v", list, err)
	}
	stamp, err := s.Save("Ærø / 2", []byte("one"), "")
	if err != nil {
		t.Fatal(err)
	}
	if err := errors.Join(s.SetCurrent("Ærø / 2"), s.SetSession("chart")); err != nil {
		t.Fatal(err)
	}
	other := NewFiles(folder)
	name, ok, err := other.Current()
	session, err2 := other.Session()
	list, err3 := other.List()
	if name != "Ærø / 2" || !ok || session != "chart" || len(list) != 1 || list[0].Name != name || errors.Join(err, err2, err3) != nil {
		t.Fatalf("another window sees %q, %v, %q, %v", name, ok, session, list)
	}
	if now := time.Now().Unix(); list[0].Changed > now || list[0].Changed < now-60 {
		t.Errorf("changed at %d, now %d", list[0].Changed, now)
	}
	if _, err := other.Save(name, []byte("two"), stamp); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Save(name, []byte("three"), stamp); !errors.Is(err, ErrChanged) {
		t.Fatalf("an old stamp: %v", err)
	}
	if err := s.Delete(name, ""); err != nil {
		t.Fatal(err)
	}
	left, _ := filepath.Glob(filepath.Join(folder, "case*"))
	if len(left) != 0 {
		t.Errorf("Delete leaves %v", left)
	}
}

func TestFilesThatCannotBeWritten(t *testing.T) {
	path := filepath.Join(t.TempDir(), "file")
	if err := os.WriteFile(path, nil, 0o600); err != nil {
		t.Fatal(err)
	}
	s := NewFiles(filepath.Join(path, "cases")) // a folder in a file
	if _, err := s.Save("Marram", []byte("x"), ""); !errors.Is(err, ErrDenied) {
		t.Errorf("Save says %v", err)
	}
	if _, err := s.List(); !errors.Is(err, ErrDenied) {
		t.Errorf("List says %v", err)
	}
}

func TestStrangeFilesAreIgnored(t *testing.T) {
	folder := t.TempDir()
	s := NewFiles(folder)
	if _, err := s.Save("Marram", []byte("good"), ""); err != nil {
		t.Fatal(err)
	}
	for _, name := range []string{"case._zz.a.kept", "case.marram.c.kept", "case.kept", "notes.txt", "case._4darram.b.kept"} {
		if err := os.WriteFile(filepath.Join(folder, name), []byte("levelspan-kept 1 9 9"), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	if err := os.Mkdir(filepath.Join(folder, "case.dunlin.a.kept"), 0o700); err != nil {
		t.Fatal(err)
	}
	list, err := s.List()
	if err != nil || len(list) != 1 || list[0].Name != "Marram" {
		t.Fatalf("List gives %v, %v", list, err)
	}
	if data, _, err := s.Load("Marram"); err != nil || string(data) != "good" {
		t.Errorf("Load gives %q, %v", data, err)
	}
}

// TestManyWindowsAtOnce lets eight stores count in one text: a save that is not refused is never lost.
func TestManyWindowsAtOnce(t *testing.T) {
	folder := t.TempDir()
	const windows, each = 8, 12
	if _, err := NewFiles(folder).Save("count", []byte("0"), ""); err != nil {
		t.Fatal(err)
	}
	var wait sync.WaitGroup
	for range windows {
		wait.Add(1)
		go func() {
			defer wait.Done()
			s := NewFiles(folder)
			for n := 0; n < each; {
				data, stamp, err := s.Load("count")
				if err != nil {
					t.Error(err)
					return
				}
				k, _ := strconv.Atoi(string(data))
				switch _, err := s.Save("count", []byte(strconv.Itoa(k+1)), stamp); {
				case err == nil:
					n++
				case !errors.Is(err, ErrChanged):
					t.Error(err)
					return
				}
			}
		}()
	}
	wait.Wait()
	if data, _, err := NewFiles(folder).Load("count"); string(data) != strconv.Itoa(windows*each) {
		t.Errorf("counted to %s, %v", data, err)
	}
}

// text is what the killed process saves as its n-th version: long, and wrong anywhere is noticed.
func text(n int) string { return fmt.Sprintf("%d:%s", n, strings.Repeat(strconv.Itoa(n)+" ", 3000)) }

const savesTo = "LEVELSPAN_TEST_SAVES_TO"

// TestMain becomes the process that saves without end when TestKilledWhileSaving starts it.
func TestMain(m *testing.M) {
	folder := os.Getenv(savesTo)
	if folder == "" {
		os.Exit(m.Run())
	}
	s := NewFiles(folder)
	data, stamp, err := s.Load("Marram")
	n := 0
	if err == nil {
		head, _, _ := strings.Cut(string(data), ":")
		n, _ = strconv.Atoi(head)
	}
	for {
		n++
		if stamp, err = s.Save("Marram", []byte(text(n)), stamp); err != nil {
			fmt.Println("error:", err)
			os.Exit(1)
		}
		fmt.Println(n)
	}
}

// TestKilledWhileSaving kills a saving process at random moments. What is kept afterwards is the last version that it said
// it had saved, or the one that it was about to: never an older one, never half of one.
func TestKilledWhileSaving(t *testing.T) {
	if runtime.GOOS == "windows" || runtime.GOOS == "js" {
		t.Skip("no kill -9 here")
	}
	folder := t.TempDir()
	random := rand.New(rand.NewPCG(3, 7))
	last, midway := 0, 0
	const kills = 60
	for kill := range kills {
		cmd := exec.Command(os.Args[0])
		cmd.Env = append(os.Environ(), savesTo+"="+folder)
		out, err := cmd.StdoutPipe()
		if err != nil {
			t.Fatal(err)
		}
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		lines := bufio.NewScanner(out)
		said := 0
		for want := 1 + random.IntN(4); said < want && lines.Scan(); said++ {
			if last, err = strconv.Atoi(lines.Text()); err != nil {
				t.Fatalf("kill %d: %s", kill, lines.Text())
			}
		}
		time.Sleep(time.Duration(random.IntN(3000)) * time.Microsecond)
		if err := cmd.Process.Kill(); err != nil {
			t.Fatal(err)
		}
		for lines.Scan() { // what it said before it died
			if last, err = strconv.Atoi(lines.Text()); err != nil {
				t.Fatalf("kill %d: %s", kill, lines.Text())
			}
		}
		_ = cmd.Wait()
		left, _ := filepath.Glob(filepath.Join(folder, "new-*.tmp"))
		midway += len(left)
		data, _, err := NewFiles(folder).Load("Marram")
		if err != nil || !bytes.Equal(data, []byte(text(last))) && !bytes.Equal(data, []byte(text(last+1))) {
			t.Fatalf("kill %d: after version %d there is %.40q (%d bytes), %v", kill, last, data, len(data), err)
		}
	}
	t.Logf("%d kills, %d of them left an unfinished file", kills, midway)
	s := NewFiles(folder)
	_, stamp, err := s.Load("Marram")
	if err != nil {
		t.Fatal(err)
	}
	if _, err := s.Save("Marram", []byte("end"), stamp); err != nil {
		t.Fatal(err)
	}
	if left, _ := filepath.Glob(filepath.Join(folder, "*")); len(left) != 3 { // two versions and the lock
		t.Errorf("there is %v in the end", left)
	}
}

func BenchmarkFilesSave(b *testing.B) {
	s := NewFiles(b.TempDir())
	stamp, data := "", []byte(text(1))
	for b.Loop() {
		var err error
		if stamp, err = s.Save("Marram", data, stamp); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkTableSave(b *testing.B) {
	s := Memory()
	stamp, data := "", []byte(text(1))
	for b.Loop() {
		var err error
		if stamp, err = s.Save("Marram", data, stamp); err != nil {
			b.Fatal(err)
		}
	}
}

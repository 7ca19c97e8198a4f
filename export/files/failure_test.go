package files

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"reflect"
	"testing"
)

// quick is the real disk without flushing, which the tests cannot see and which takes most of the time.
type quick struct{ osDisk }

func (quick) writeFile(name string, data []byte) error { return os.WriteFile(name, data, 0o666) }
func (quick) syncDir(string) error                     { return nil }

// noExchange is a system without the one-step exchange.
type noExchange struct{ quick }

func (noExchange) exchange(string, string) error { return errNoExchange }

func disks() []struct {
	name string
	disk disk
} {
	return []struct {
		name string
		disk disk
	}{{"exchange", quick{}}, {"two renames", noExchange{}}}
}

var errInjected = errors.New("injected failure")

// faulty fails at the operation number at (counted from 0); killed ones fail at every one after it
// too, as if the program were gone, and the file being written then is cut short.
type faulty struct {
	quick
	plain  bool // no exchange
	at     int
	killed bool
	err    error
	n      int
}

func (f *faulty) fails() bool {
	f.n++
	return f.n-1 == f.at || f.killed && f.n-1 > f.at
}

func (f *faulty) do(run func() error) error {
	if f.fails() {
		return f.err
	}
	return run()
}

func (f *faulty) mkdir(name string, mode fs.FileMode) error {
	return f.do(func() error { return f.quick.mkdir(name, mode) })
}

func (f *faulty) chmod(name string, mode fs.FileMode) error {
	return f.do(func() error { return f.quick.chmod(name, mode) })
}

func (f *faulty) syncDir(name string) error {
	return f.do(func() error { return f.quick.syncDir(name) })
}

func (f *faulty) rename(from, to string) error {
	return f.do(func() error { return f.quick.rename(from, to) })
}

func (f *faulty) exchange(a, b string) error {
	if f.plain {
		return errNoExchange
	}
	return f.do(func() error { return f.quick.exchange(a, b) })
}

func (f *faulty) remove(name string) error {
	return f.do(func() error { return f.quick.remove(name) })
}

func (f *faulty) removeAll(name string) error {
	return f.do(func() error { return f.quick.removeAll(name) })
}

func (f *faulty) writeFile(name string, data []byte) error {
	if f.fails() {
		if !f.killed || f.n-1 == f.at {
			_ = os.WriteFile(name, data[:len(data)/2], 0o666)
		}
		return f.err
	}
	return f.quick.writeFile(name, data)
}

// Every operation on the disk is made to fail in turn, and the program is killed at every one in turn.
func TestAllOrNone(t *testing.T) {
	old, fresh := set("old", "a.dxf", "gone.dxf", "parts/crank.dxf"), set("new", "a.dxf", "b.dxf", "parts/coupler.dxf", "more/x.csv")
	mine := []string{"notes.txt", "mine", "parts/more.txt", "mine", "photos/", "", "photos/1.png", "mine", "kept/", "", "kept/x.txt", "mine"}
	for _, first := range []bool{true, false} {
		for _, plain := range []bool{false, true} {
			for _, killed := range []bool{false, true} {
				name := fmt.Sprintf("first run %v, no exchange %v, killed %v", first, plain, killed)
				t.Run(name, func(t *testing.T) {
					for at := 0; ; at++ {
						if !failAt(t, at, first, plain, killed, old, fresh, mine) {
							if at < 10 {
								t.Errorf("only %d operations", at)
							}
							break
						}
						if t.Failed() {
							t.Fatalf("at operation %d", at)
						}
					}
				})
			}
		}
	}
}

func failAt(t *testing.T, at int, first, plain, killed bool, old, fresh []File, mine []string) (reached bool) {
	tmp := t.TempDir()
	out := filepath.Join(tmp, "new", "out")
	oldTree, newTree := map[string]string{}, want(fresh)
	if !first {
		commitOK(t, out, old)
		for i := 0; i < len(mine); i += 2 {
			if mine[i+1] != "" {
				put(t, filepath.Join(out, mine[i]), mine[i+1])
			}
		}
		oldTree, newTree = want(old, mine...), want(fresh, mine...)
	}
	f := &faulty{plain: plain, at: at, killed: killed, err: errInjected}
	err := commit(f, out, fresh, Listed)
	if f.n <= at {
		if err != nil {
			t.Errorf("nothing failed, and yet: %v", err)
		}
		return false
	}
	got := tree(t, out)
	switch {
	case !killed && err != nil:
		if !errors.Is(err, errInjected) {
			t.Errorf("the reason is lost: %v", err)
		}
		if !reflect.DeepEqual(got, oldTree) {
			t.Errorf("after %v:\ngot  %v\nwant %v", err, got, oldTree)
		}
	case !killed:
		if !reflect.DeepEqual(got, newTree) {
			t.Errorf("no error, and yet:\ngot  %v\nwant %v", got, newTree)
		}
	default:
		// Killed: of our files all old, all new, or (for a moment, without exchange) none.
		if !whole(got, old) && !whole(got, fresh) && (len(got) > 0 || !first && !plain) {
			t.Errorf("neither the old set nor the new one: %v", got)
		}
	}
	// The next run sets everything right, and the maker's files are home.
	next := set("next", "a.dxf", "c.dxf")
	nextTree := want(next)
	if !first {
		nextTree = want(next, append(mine, "parts/", "")...)
	}
	if err := commit(quick{}, out, next, Listed); err != nil {
		t.Errorf("next run: %v", err)
	}
	same(t, out, nextTree)
	alone(t, filepath.Dir(out), "out")
	return true
}

// whole tells whether the files of the set, and of our own files no others, are in the tree.
func whole(tree map[string]string, set []File) bool {
	ours := map[string]string{}
	for name, data := range tree {
		if data != "" && data != "mine" {
			ours[name] = data
		}
	}
	files := map[string]string{}
	for _, f := range set {
		files[f.Name] = string(f.Data)
	}
	return reflect.DeepEqual(ours, files)
}

// What a living run is writing to is not cleared away by another.
func TestTwoRunsAtOnce(t *testing.T) {
	tmp := t.TempDir()
	out := filepath.Join(tmp, "out")
	one := set("one", "a.dxf")
	commitOK(t, out, one)
	unlock, free := lock(out)
	if !free {
		t.Fatal("locked by nobody")
	}
	if _, again := lock(out); again {
		t.Skip("no locks on this system")
	}
	var refused *RefusedError
	if err := Commit(out, set("two", "a.dxf"), Listed); !errors.As(err, &refused) {
		t.Errorf("got %v", err)
	}
	same(t, out, want(one))
	unlock()
	stage := filepath.Join(tmp, ".out.pinwright-new-1-1")
	put(t, filepath.Join(stage, "a.dxf"), "half")
	unlock, _ = lock(stage)
	commitOK(t, out, one)
	alone(t, tmp, ".out.pinwright-new-1-1", "out")
	unlock()
	commitOK(t, out, one)
	alone(t, tmp, "out")
}

// A file of the maker's that a killed run left beside and that has since been made anew is not lost.
func TestLeftoverThatCannotComeHome(t *testing.T) {
	tmp := t.TempDir()
	out := filepath.Join(tmp, "out")
	one := set("one", "a.dxf")
	commitOK(t, out, one)
	put(t, filepath.Join(out, "notes.txt"), "new")
	left := filepath.Join(tmp, ".out.pinwright-old-1-1")
	commitOK(t, left, one)
	put(t, filepath.Join(left, "notes.txt"), "old")
	commitOK(t, out, one)
	same(t, out, want(one, "notes.txt", "new"))
	same(t, left, want(one, "notes.txt", "old"))
}

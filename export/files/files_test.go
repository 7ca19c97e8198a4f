package files

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"reflect"
	"runtime"
	"sort"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// set makes files with their manifest.
func set(data string, names ...string) []File {
	var s []File
	var listed []string
	for _, n := range names {
		s = append(s, File{Name: n, Data: []byte(data + " " + n)})
		listed = append(listed, fmt.Sprintf(`{"name": %q}`, n))
	}
	m := `{"program": "pinwright 0.1", "data": "` + data + `", "files": [` + strings.Join(listed, ", ") + `]}`
	// The manifest in front, to see that it is written last all the same.
	return append([]File{{Name: Manifest, Data: []byte(m)}}, s...)
}

// tree reads a directory as name to content; directories end in a slash, links in an @.
func tree(t testing.TB, dir string) map[string]string {
	t.Helper()
	got := map[string]string{}
	err := filepath.WalkDir(dir, func(p string, e fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		rel, _ := filepath.Rel(dir, p)
		rel = filepath.ToSlash(rel)
		switch {
		case rel == ".":
		case e.IsDir():
			got[rel+"/"] = ""
		case e.Type()&fs.ModeSymlink != 0:
			got[rel+"@"], _ = os.Readlink(p)
		default:
			data, err := os.ReadFile(p)
			if err != nil {
				return err
			}
			got[rel] = string(data)
		}
		return nil
	})
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		t.Fatal(err)
	}
	return got
}

func want(s []File, more ...string) map[string]string {
	m := map[string]string{}
	for _, f := range s {
		m[f.Name] = string(f.Data)
		for d := filepath.ToSlash(filepath.Dir(f.Name)); d != "."; d = filepath.ToSlash(filepath.Dir(d)) {
			m[d+"/"] = ""
		}
	}
	for i := 0; i < len(more); i += 2 {
		m[more[i]] = more[i+1]
	}
	return m
}

func same(t testing.TB, dir string, want map[string]string) {
	t.Helper()
	if got := tree(t, dir); !reflect.DeepEqual(got, want) {
		t.Errorf("got  %v\nwant %v", got, want)
	}
}

func put(t testing.TB, name, data string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(name), 0o777); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(name, []byte(data), 0o666); err != nil {
		t.Fatal(err)
	}
}

func alone(t testing.TB, parent string, names ...string) {
	t.Helper()
	entries, err := os.ReadDir(parent)
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, e := range entries {
		got = append(got, e.Name())
	}
	sort.Strings(names)
	if !reflect.DeepEqual(got, names) {
		t.Errorf("beside: %v, want %v", got, names)
	}
}

func Example() {
	tmp, err := os.MkdirTemp("", "")
	if err != nil {
		panic(err)
	}
	defer os.RemoveAll(tmp)
	out := filepath.Join(tmp, "out")
	show := func() {
		entries, _ := os.ReadDir(out)
		for _, e := range entries {
			fmt.Println(e.Name())
		}
		fmt.Println("--")
	}
	first := []File{
		{Name: "clear3-1.dxf", Data: []byte("...")},
		{Name: "clear3-2.dxf", Data: []byte("...")},
		{Name: Manifest, Data: []byte(`{"program": "pinwright", "files": [{"name": "clear3-1.dxf"}, {"name": "clear3-2.dxf"}]}`)},
	}
	if err := Commit(out, first, Listed); err != nil {
		panic(err)
	}
	show()
	// The maker adds a note; a later run needs one sheet only.
	_ = os.WriteFile(filepath.Join(out, "notes.txt"), []byte("cut slowly"), 0o666)
	second := []File{first[0], {Name: Manifest, Data: []byte(`{"program": "pinwright", "files": [{"name": "clear3-1.dxf"}]}`)}}
	if err := Commit(out, second, nil); err != nil {
		panic(err)
	}
	show()
	// Output:
	// clear3-1.dxf
	// clear3-2.dxf
	// manifest.json
	// --
	// clear3-1.dxf
	// manifest.json
	// notes.txt
	// --
}

func TestCommit(t *testing.T) {
	one := set("one", "a.dxf", "parts/crank.dxf", "parts/coupler.dxf")
	two := set("two", "a.dxf", "b.dxf", "parts/crank.dxf")
	tests := []struct {
		name   string
		before func(t *testing.T, tmp string)
		out    string
		set    []File
		want   map[string]string
		beside []string
	}{
		{"a new directory", nil, "out", one, want(one), []string{"out"}},
		{"parents that are missing", nil, "deep/er/out", one, want(one), []string{"deep"}},
		{"an empty directory", func(t *testing.T, tmp string) { os.Mkdir(filepath.Join(tmp, "out"), 0o755) }, "out", one, want(one), []string{"out"}},
		{"a directory that a file manager has looked into", func(t *testing.T, tmp string) {
			put(t, filepath.Join(tmp, "out", ".DS_Store"), "mac")
		}, "out", one, want(one, ".DS_Store", "mac"), []string{"out"}},
		{"a second run", func(t *testing.T, tmp string) { commitOK(t, filepath.Join(tmp, "out"), one) }, "out", two, want(two), []string{"out"}},
		{"files of the maker's stay", func(t *testing.T, tmp string) {
			commitOK(t, filepath.Join(tmp, "out"), one)
			put(t, filepath.Join(tmp, "out", "notes.txt"), "mine")
			put(t, filepath.Join(tmp, "out", "parts", "more.txt"), "mine too")
			put(t, filepath.Join(tmp, "out", "photos", "x", "1.png"), "png")
			os.Mkdir(filepath.Join(tmp, "out", "empty"), 0o755)
		}, "out", two, want(two, "notes.txt", "mine", "parts/more.txt", "mine too", "photos/", "", "photos/x/", "", "photos/x/1.png", "png", "empty/", ""), []string{"out"}},
		{"a directory of ours goes when only the maker's is left in it", func(t *testing.T, tmp string) {
			commitOK(t, filepath.Join(tmp, "out"), one)
			put(t, filepath.Join(tmp, "out", "parts", "more.txt"), "mine")
		}, "out", set("three", "c.dxf"), want(set("three", "c.dxf"), "parts/", "", "parts/more.txt", "mine"), []string{"out"}},
		{"a directory of the maker's is shared", func(t *testing.T, tmp string) {
			commitOK(t, filepath.Join(tmp, "out"), set("zero", "c.dxf"))
			put(t, filepath.Join(tmp, "out", "parts", "more.txt"), "mine")
		}, "out", one, want(one, "parts/more.txt", "mine"), []string{"out"}},
	}
	for _, d := range disks() {
		for _, test := range tests {
			t.Run(d.name+"/"+test.name, func(t *testing.T) {
				tmp := t.TempDir()
				if test.before != nil {
					test.before(t, tmp)
				}
				if err := commit(d.disk, filepath.Join(tmp, filepath.FromSlash(test.out)), test.set, Listed); err != nil {
					t.Fatal(err)
				}
				same(t, filepath.Join(tmp, filepath.FromSlash(test.out)), test.want)
				alone(t, tmp, test.beside...)
			})
		}
	}
}

func commitOK(t testing.TB, out string, s []File) {
	t.Helper()
	if err := commit(quick{}, out, s, Listed); err != nil {
		t.Fatal(err)
	}
}

func TestRefused(t *testing.T) {
	one := set("one", "a.dxf")
	tests := []struct {
		name   string
		before func(t *testing.T, out string)
		set    []File
		want   string
	}{
		{"a file", func(t *testing.T, out string) { put(t, out, "x") }, one, "is a file, not a directory: choose another name or move it away"},
		{"somebody's directory", func(t *testing.T, out string) { put(t, filepath.Join(out, "thesis.tex"), "x") }, one, "holds files that are not from an earlier run (thesis.tex: there is no manifest.json), and they are left alone: choose another directory"},
		{"another program's manifest", func(t *testing.T, out string) {
			put(t, filepath.Join(out, Manifest), `{"name": "app", "icons": []}`)
		}, one, "holds files that are not from an earlier run (manifest.json: manifest.json is not a manifest of Pinwright), and they are left alone: choose another directory"},
		{"a manifest that is a directory", func(t *testing.T, out string) { put(t, filepath.Join(out, Manifest, "x"), "x") }, one, "holds files that are not from an earlier run (manifest.json: manifest.json is not a plain file), and they are left alone: choose another directory"},
		{"a name that is taken", func(t *testing.T, out string) {
			commitOK(t, out, one)
			put(t, filepath.Join(out, "B.dxf"), "drawn by hand")
		}, set("two", "a.dxf", "b.dxf"), "B.dxf in it is not from an earlier run, and the new files need its place: move it away"},
		{"a file where a directory must be", func(t *testing.T, out string) {
			commitOK(t, out, one)
			put(t, filepath.Join(out, "parts"), "x")
		}, set("two", "parts/b.dxf"), "parts in it is not from an earlier run, and the new files need its place: move it away"},
		{"a directory where a file must be", func(t *testing.T, out string) {
			commitOK(t, out, one)
			put(t, filepath.Join(out, "b.dxf", "x"), "x")
		}, set("two", "b.dxf"), "b.dxf in it is not from an earlier run, and the new files need its place: move it away"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			tmp := t.TempDir()
			out := filepath.Join(tmp, "out")
			test.before(t, out)
			before := tree(t, tmp)
			err := Commit(out, test.set, Listed)
			var refused *RefusedError
			if !errors.As(err, &refused) || refused.Why != test.want || refused.Dir != out {
				t.Errorf("got %v\nwant %s", err, test.want)
			}
			same(t, tmp, before)
		})
	}
	for _, dir := range []string{"", "/", ".", ".."} {
		var refused *RefusedError
		if err := Commit(dir, one, Listed); !errors.As(err, &refused) {
			t.Errorf("%q: got %v", dir, err)
		}
	}
	under := filepath.Join(t.TempDir(), "file")
	put(t, under, "x")
	if err := Commit(filepath.Join(under, "out"), one, Listed); err == nil || !strings.Contains(err.Error(), "file") {
		t.Errorf("below a file: %v", err)
	}
	if err := Commit(filepath.Join(under, "out", "deeper"), one, Listed); err == nil || !strings.Contains(err.Error(), "file") {
		t.Errorf("below a file: %v", err)
	}
}

func TestNames(t *testing.T) {
	for name, want := range map[string]string{
		"../a": "not a plain relative name", "/a": "not a plain relative name", "a//b": "not a plain relative name",
		"": "not a plain relative name", ".": "not a plain relative name", "a/./b": "not a plain relative name",
		`a\b`: `the character '\\' cannot be in a file name`, "a:b": "the character ':' cannot be in a file name",
		"con": "CON is kept by some systems for a device", "x/aux.dxf": "AUX is kept by some systems for a device",
		"a.": "a name cannot end with a dot or a space", "a /b": "a name cannot end with a dot or a space",
	} {
		if err := checkNames([]File{{Name: name}}); err == nil || err.Error() != fmt.Sprintf("file %q: %s", name, want) {
			t.Errorf("%q: %v", name, err)
		}
	}
	for want, s := range map[string][]File{
		`file "A.dxf": the name is taken by "a.dxf"`:                 set("x", "a.dxf", "A.dxf"),
		`file "parts/a": its directory is the file "PARTS"`:          set("x", "parts/a", "PARTS"),
		`the set has no manifest.json`:                               {{Name: "a.dxf"}},
		`file "MANIFEST.JSON": the name is taken by "manifest.json"`: set("x", "MANIFEST.JSON"),
	} {
		if err := checkNames(s); err == nil || err.Error() != want {
			t.Errorf("got %v, want %s", err, want)
		}
	}
}

func TestLinks(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("making a link needs a right there")
	}
	tmp := t.TempDir()
	one, two := set("one", "a.dxf"), set("two", "a.dxf")
	real := filepath.Join(tmp, "real", "out")
	commitOK(t, real, one)
	link := filepath.Join(tmp, "link")
	if err := os.Symlink(real, link); err != nil {
		t.Fatal(err)
	}
	// A link in the directory is the maker's, even under a name of ours; what it leads to is not touched.
	if err := os.Remove(filepath.Join(real, "a.dxf")); err != nil {
		t.Fatal(err)
	}
	put(t, filepath.Join(tmp, "precious"), "x")
	if err := os.Symlink(filepath.Join(tmp, "precious"), filepath.Join(real, "a.dxf")); err != nil {
		t.Fatal(err)
	}
	if err := Commit(link, two, Listed); err == nil || !strings.Contains(err.Error(), "a.dxf in it is not from an earlier run") {
		t.Errorf("got %v", err)
	}
	if err := os.Rename(filepath.Join(real, "a.dxf"), filepath.Join(real, "other")); err != nil {
		t.Fatal(err)
	}
	commitOK(t, link, two)
	same(t, real, want(two, "other@", filepath.Join(tmp, "precious")))
	if to, err := os.Readlink(link); err != nil || to != real {
		t.Errorf("the link was replaced: %s %v", to, err)
	}
	alone(t, filepath.Join(tmp, "real"), "out")
	dead := filepath.Join(tmp, "dead")
	_ = os.Symlink(filepath.Join(tmp, "nowhere"), dead)
	if err := Commit(dead, two, Listed); err == nil || !strings.Contains(err.Error(), "leads nowhere") {
		t.Errorf("got %v", err)
	}
}

func TestWorkingDirectoryIsKept(t *testing.T) {
	tmp := t.TempDir()
	out := filepath.Join(tmp, "out")
	one := set("one", "a.dxf", "parts/b.dxf")
	commitOK(t, out, one)
	t.Chdir(filepath.Join(out, "parts"))
	if err := Commit(out, one, Listed); err == nil || !strings.Contains(err.Error(), "run from outside it") {
		t.Errorf("got %v", err)
	}
	commitOK(t, filepath.Join("..", "..", "out2"), one)
}

func TestNoPermission(t *testing.T) {
	tmp := t.TempDir()
	f := &faulty{at: 0, err: fs.ErrPermission}
	err := commit(f, filepath.Join(tmp, "out"), set("one", "a.dxf"), Listed)
	if !errors.Is(err, fs.ErrPermission) || !strings.Contains(err.Error(), "choose another directory") {
		t.Errorf("got %v", err)
	}
	alone(t, tmp)
}

func TestModeIsKept(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("no such modes there")
	}
	out := filepath.Join(t.TempDir(), "out")
	commitOK(t, out, set("one", "a.dxf"))
	if err := os.Chmod(out, 0o750); err != nil {
		t.Fatal(err)
	}
	commitOK(t, out, set("two", "a.dxf"))
	if info, err := os.Stat(out); err != nil || info.Mode().Perm() != 0o750 {
		t.Errorf("%v %v", info.Mode(), err)
	}
}

// Listed is a door for bytes that anyone may have written.
func FuzzListed(f *testing.F) {
	f.Add([]byte(`{"program": "pinwright", "files": [{"name": "a"}]}`))
	f.Add([]byte(`[]`))
	f.Fuzz(func(t *testing.T, data []byte) {
		if names, err := Listed(data); err != nil && names != nil {
			t.Fatal("names in spite of an error")
		}
	})
}

// Whatever sets follow one another, the last is there and nothing else, but for the maker's.
func TestRunsInARow(t *testing.T) {
	names := []string{"a.dxf", "b.svg", "parts/a.dxf", "parts/b.dxf", "parts/deep/c.dxf", "lists/parts.csv"}
	rapid.Check(t, func(rt *rapid.T) {
		tmp, err := os.MkdirTemp("", "")
		if err != nil {
			rt.Fatal(err)
		}
		defer os.RemoveAll(tmp)
		out := filepath.Join(tmp, "out")
		d := disks()[rapid.IntRange(0, 1).Draw(rt, "disk")].disk
		mine := map[string]string{}
		for run := range rapid.IntRange(1, 4).Draw(rt, "runs") {
			s := set(fmt.Sprint("run ", run), rapid.SliceOfDistinct(rapid.SampledFrom(names), rapid.ID[string]).Draw(rt, "names")...)
			if err := commit(d, out, s, Listed); err != nil {
				rt.Fatal(err)
			}
			expect := want(s)
			for name, data := range mine {
				expect[name] = data
				for p := filepath.ToSlash(filepath.Dir(name)); p != "."; p = filepath.ToSlash(filepath.Dir(p)) {
					expect[p+"/"] = ""
				}
			}
			if got := tree(t, out); !reflect.DeepEqual(got, expect) {
				rt.Fatalf("got  %v\nwant %v", got, expect)
			}
			if entries, _ := os.ReadDir(tmp); len(entries) != 1 {
				rt.Fatalf("left beside: %v", entries)
			}
			for _, name := range rapid.SliceOfN(rapid.SampledFrom([]string{"n.txt", "parts/n.txt", "x/y/n.txt", "parts/deep/n.txt"}), 0, 2).Draw(rt, "mine") {
				put(t, filepath.Join(out, name), name)
				mine[name] = name
			}
		}
	})
}

func BenchmarkCommit20Files(b *testing.B) {
	out := filepath.Join(b.TempDir(), "out")
	var names []string
	for i := range 20 {
		names = append(names, fmt.Sprintf("sheet-%d.dxf", i))
	}
	s := set(strings.Repeat("x", 10000), names...)
	for b.Loop() {
		if err := Commit(out, s, Listed); err != nil {
			b.Fatal(err)
		}
	}
}

package files

import (
	"encoding/json"
	"errors"
	"fmt"
	"io/fs"
	"path"
	"strings"
)

// Listed reads the names of the files from a manifest: a JSON object with "program": "pinwright 0.1.0"
// (of any version) and "files": [{"name": "clear3-1.dxf"}, ...]. Nothing else in it is looked at.
func Listed(manifest []byte) ([]string, error) {
	var m struct {
		Program string `json:"program"`
		Files   []struct {
			Name string `json:"name"`
		} `json:"files"`
	}
	if err := json.Unmarshal(manifest, &m); err != nil {
		return nil, fmt.Errorf("not a manifest: %w", err)
	}
	if name, _, _ := strings.Cut(m.Program, " "); name != "pinwright" {
		return nil, errors.New("not a manifest of Pinwright")
	}
	names := make([]string, len(m.Files))
	for i, f := range m.Files {
		names[i] = f.Name
	}
	return names, nil
}

// checkNames refuses a set that could not be written on every system: names that leave the
// directory, that differ in case only, that are a file and a directory at once, or that some
// system keeps for itself.
func checkNames(set []File) error {
	seen := map[string]string{}
	manifest := false
	for _, f := range set {
		if err := checkName(f.Name); err != nil {
			return fmt.Errorf("file %q: %w", f.Name, err)
		}
		if other, taken := seen[fold(f.Name)]; taken {
			return fmt.Errorf("file %q: the name is taken by %q", f.Name, other)
		}
		seen[fold(f.Name)] = f.Name
		manifest = manifest || f.Name == Manifest
	}
	for _, f := range set {
		for dir := path.Dir(f.Name); dir != "."; dir = path.Dir(dir) {
			if other, taken := seen[fold(dir)]; taken {
				return fmt.Errorf("file %q: its directory is the file %q", f.Name, other)
			}
		}
	}
	if !manifest {
		return fmt.Errorf("the set has no %s", Manifest)
	}
	return nil
}

func namesOf(set []File) []string {
	names := make([]string, len(set))
	for i, f := range set {
		names[i] = f.Name
	}
	return names
}

func checkName(name string) error {
	if name == "." || !fs.ValidPath(name) {
		return errors.New("not a plain relative name")
	}
	for _, part := range strings.Split(name, "/") {
		// What Windows does not take: Microsoft, "Naming Files, Paths, and Namespaces".
		if i := strings.IndexFunc(part, func(r rune) bool {
			return r < ' ' || strings.ContainsRune(`<>:"\|?*`, r)
		}); i >= 0 {
			return fmt.Errorf("the character %q cannot be in a file name", []rune(part[i:])[0])
		}
		if strings.HasSuffix(part, ".") || strings.HasSuffix(part, " ") {
			return errors.New("a name cannot end with a dot or a space")
		}
		stem, _, _ := strings.Cut(strings.ToUpper(part), ".")
		if reserved[strings.TrimRight(stem, " ")] {
			return fmt.Errorf("%s is kept by some systems for a device", stem)
		}
	}
	return nil
}

var reserved = map[string]bool{
	"CON": true, "PRN": true, "AUX": true, "NUL": true,
	"COM1": true, "COM2": true, "COM3": true, "COM4": true, "COM5": true, "COM6": true, "COM7": true, "COM8": true, "COM9": true,
	"LPT1": true, "LPT2": true, "LPT3": true, "LPT4": true, "LPT5": true, "LPT6": true, "LPT7": true, "LPT8": true, "LPT9": true,
}

// fold makes names equal that a file system without regard for case takes for equal.
func fold(name string) string { return strings.ToLower(strings.ToUpper(name)) }

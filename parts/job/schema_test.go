package job

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"go.yaml.in/yaml/v3"
)

func compileSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema()))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("job.json", doc); err != nil {
		t.Fatal(err)
	}
	s, err := c.Compile("job.json")
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// instance turns YAML into what a JSON validator takes.
func instance(t *testing.T, text []byte) any {
	t.Helper()
	var v any
	if err := yaml.Unmarshal(text, &v); err != nil {
		t.Fatal(err)
	}
	data, err := json.Marshal(v)
	if err != nil {
		t.Fatal(err)
	}
	out, err := jsonschema.UnmarshalJSON(bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func TestSchemaTakesGoodJobs(t *testing.T) {
	s := compileSchema(t)
	if err := s.Validate(instance(t, Starter())); err != nil {
		t.Errorf("starter: %v", err)
	}
	files, _ := filepath.Glob(jobsDir + "/*.yaml")
	if len(files) < 6 {
		t.Fatalf("%d job files", len(files))
	}
	for _, file := range files {
		data, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		if err := s.Validate(instance(t, data)); err != nil {
			t.Errorf("%s: %v", file, err)
		}
	}
}

// TestSchemaRefusesBrokenJobs: what the schema can know, it knows: every unknown key and every unknown
// word of a choice is refused by it as by the reader.
func TestSchemaRefusesBrokenJobs(t *testing.T) {
	s := compileSchema(t)
	for _, name := range []string{
		"unknown-key", "unknown-key-top", "unknown-key-slip", "unknown-key-elsewhere", "unknown-key-far", "unknown-key-american",
		"underscore", "shape-unknown", "grain-unknown", "compensated-by-unknown", "nut-unknown", "drive-word", "kerf-missing",
		"margin-missing", "no-job", "no-stock", "joint-name-hyphen", "length-not-pair", "place-one", "place-three", "yes",
		"plane-fraction", "angle-for-length", "length-for-angle", "unknown-unit", "negative-length", "zero-length", "bore-two-kinds",
		"bore-no-kind", "sheet-one-side", "quantity-zero", "job-name", "list-empty", "text-for-list", "units-text", "units-wrong", "a-list",
	} {
		data, err := os.ReadFile("testdata/broken/" + name + ".yaml")
		if err != nil {
			t.Fatal(err)
		}
		if s.Validate(instance(t, data)) == nil {
			t.Errorf("%s was taken", name)
		}
	}
}

// TestSchemaKeys: the reader's keys and those of the schema are the same set, and every key says what
// it means.
func TestSchemaKeys(t *testing.T) {
	var root map[string]any
	if err := json.Unmarshal(Schema(), &root); err != nil {
		t.Fatal(err)
	}
	found := map[string]bool{}
	var visit func(at map[string]any, path string)
	visit = func(at map[string]any, path string) {
		if properties, ok := at["properties"].(map[string]any); ok {
			for name, v := range properties {
				child := v.(map[string]any)
				p := strings.TrimPrefix(path+"."+name, ".")
				found[p] = true
				if about, _ := child["description"].(string); len(about) < 8 || !strings.HasSuffix(about, ".") {
					t.Errorf("%s is described as %q", p, about)
				}
				visit(child, p)
			}
			if at["additionalProperties"] != false {
				t.Errorf("%s takes any key", path)
			}
		}
		if free, ok := at["patternProperties"].(map[string]any); ok {
			for _, v := range free {
				visit(v.(map[string]any), path+".*")
			}
		}
		if items, ok := at["items"].(map[string]any); ok {
			visit(items, path)
		}
		if variants, ok := at["anyOf"].([]any); ok {
			for _, v := range variants {
				visit(v.(map[string]any), path)
			}
		}
	}
	visit(root, "")
	var inSchema []string
	for p := range found {
		inSchema = append(inSchema, p)
	}
	slices.Sort(inSchema)
	if want := keyPaths(&jobForm); !slices.Equal(inSchema, want) {
		t.Errorf("schema has\n%v\nreader has\n%v", inSchema, want)
	}
	if len(inSchema) < 100 {
		t.Errorf("%d keys only", len(inSchema))
	}
}

// TestEveryKeyIsRead: a key that is in the table but that the reader never asks for would be taken and
// forgotten. Every key name must be asked for by name somewhere in the package.
func TestEveryKeyIsRead(t *testing.T) {
	var code strings.Builder
	files, _ := filepath.Glob("*.go")
	for _, file := range files {
		if strings.HasSuffix(file, "_test.go") || file == "keys.go" {
			continue
		}
		data, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		code.Write(data)
	}
	for _, p := range keyPaths(&jobForm) {
		name := p[strings.LastIndexByte(p, '.')+1:]
		if !strings.Contains(code.String(), `"`+name+`"`) {
			t.Errorf("%s is never read", p)
		}
	}
}

package main

import (
	"os/exec"
	"slices"
	"strings"
	"testing"
)

// mayImport lists, for each package, those of ours it may depend on, directly
// or not. The direction is chem ← inventory ← planner ← views ← cmd; static is
// a leaf that views embeds.
var mayImport = map[string][]string{
	"stillroom/chem":             {},
	"stillroom/static":           {},
	"stillroom/inventory":        {"stillroom/chem"},
	"stillroom/planner":          {"stillroom/chem", "stillroom/inventory"},
	"stillroom/planner/reckoner": {"stillroom/chem", "stillroom/inventory", "stillroom/planner"},
	"stillroom/views": {"stillroom/chem", "stillroom/inventory", "stillroom/planner",
		"stillroom/planner/reckoner", "stillroom/static"},
	"stillroom/cmd/stillroom": {"stillroom/chem", "stillroom/inventory", "stillroom/planner",
		"stillroom/planner/reckoner", "stillroom/static", "stillroom/views"},
}

// mustNotImport names packages that would put knowledge where it doesn't
// belong, and why.
var mustNotImport = []struct{ pkg, unwanted, why string }{
	{"stillroom/chem", "net/http", "chemistry knows no HTTP"},
	{"stillroom/chem", "database/sql", "chemistry knows no database"},
	{"stillroom/chem", "gorm.io/gorm", "chemistry knows no database"},
	{"stillroom/inventory", "html/template", "stock knows no HTML"},
	{"stillroom/planner", "html/template", "plans know no HTML"},
}

// gormOnlyIn is the one package that may import gorm by itself.
const gormOnlyIn = "stillroom/inventory"

func TestImportsGoOneWay(t *testing.T) {
	packages := strings.Fields(goList(t, "stillroom/..."))
	for _, pkg := range packages {
		allowed, known := mayImport[pkg]
		if !known {
			t.Errorf("%s has no line in mayImport: say which way it points", pkg)
			continue
		}
		deps := strings.Fields(goList(t, "-deps", pkg))
		for _, dep := range deps {
			if strings.HasPrefix(dep, "stillroom/") && dep != pkg && !slices.Contains(allowed, dep) {
				t.Errorf("%s depends on %s, against the direction of the code", pkg, dep)
			}
		}
		direct := strings.Fields(goList(t, "-f", `{{join .Imports " "}}`, pkg))
		if pkg != gormOnlyIn && slices.Contains(direct, "gorm.io/gorm") {
			t.Errorf("%s imports gorm: only %s does", pkg, gormOnlyIn)
		}
		for _, rule := range mustNotImport {
			if rule.pkg == pkg && slices.Contains(direct, rule.unwanted) {
				t.Errorf("%s imports %s: %s", pkg, rule.unwanted, rule.why)
			}
		}
	}
}

func goList(t *testing.T, args ...string) string {
	t.Helper()
	out, err := exec.Command("go", append([]string{"list"}, args...)...).Output()
	if err != nil {
		t.Fatalf("go list %v: %v", args, err)
	}
	return string(out)
}

package views

import (
	"math"
	"testing"
)

// The volumes of a cylinder, a cone and a sphere are those of any book of
// geometry: πr²h, πr²h/3 and 4πr³/3.
func TestProfileVolume(t *testing.T) {
	sphere := profile{points: arc(nil, 10, 10, 0, math.Pi)}
	tests := []struct {
		name string
		p    profile
		at   float64
		want float64
		tol  float64 // relative
	}{
		{"cylinder", profile{points: []outlinePoint{{0, 2}, {10, 2}}}, 7, math.Pi * 4 * 7, 1e-12},
		{"cone on its tip", profile{points: []outlinePoint{{0, 0}, {9, 3}}}, 9, math.Pi * 9 * 9 / 3, 1e-12},
		{"lower third of the cone", profile{points: []outlinePoint{{0, 0}, {9, 3}}}, 3, math.Pi * 1 * 3 / 3, 1e-12},
		// Eighteen frustums are within a per cent of the sphere they stand for.
		{"sphere", sphere, 20, 4. / 3 * math.Pi * 1000, 0.01},
	}
	for _, tt := range tests {
		if got := tt.p.volume(tt.at); math.Abs(got-tt.want) > tt.tol*tt.want {
			t.Errorf("%s: volume %v, want %v", tt.name, got, tt.want)
		}
	}
}

func TestProfileLevel(t *testing.T) {
	cone := profile{points: []outlinePoint{{0, 0}, {8, 4}}, mark: 8}
	// An eighth of a cone on its tip stands at half of its height.
	if got := cone.level(1. / 8); math.Abs(got-4) > 2e-3 {
		t.Errorf("an eighth of the cone stands at %v, want 4", got)
	}
	sphere := profile{points: arc(nil, 10, 10, 0, math.Pi), mark: 20}
	if got := sphere.level(0.5); math.Abs(got-10) > 2e-3 {
		t.Errorf("half of the sphere stands at %v, want 10", got)
	}
}

// Whatever the ware, the level rises with the fill, begins at the bottom and
// reaches the mark at the nominal volume.
func TestWareLevels(t *testing.T) {
	for _, kind := range []string{"round flask", "conical flask", "separating funnel", "filter flask", "beaker", "cylinder", "bottle", "jar", "carboy"} {
		p := wareProfile(kind)
		last := -1.0
		for fill := 0.0; fill <= 1; fill += 0.05 {
			h := p.level(fill)
			if h <= last {
				t.Errorf("%s: level %v at %v, not above %v", kind, h, fill, last)
			}
			last = h
		}
		if got := p.level(1); math.Abs(got-p.mark) > 2e-3 {
			t.Errorf("%s: full at %v, want the mark %v", kind, got, p.mark)
		}
		if got := p.level(5); got != p.height() {
			t.Errorf("%s: overfull stands at %v, want the mouth", kind, got)
		}
	}
}

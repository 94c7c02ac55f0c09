package views

import (
	"math"
	"sync"
)

// Outlines of the ware, each about a hundred units high. Their proportions are
// those of ordinary glassware, drawn by us.

// roundFlask is a sphere with a neck; its nominal volume ends where the neck
// begins.
var roundFlask = sync.OnceValue(func() profile {
	const r, neck = 35.0, 9.5
	p := arc(nil, r, r, 0, math.Pi-math.Asin(neck/r))
	mark := p[len(p)-1].h
	return profile{append(p, outlinePoint{mark + 30, neck}), mark}
})

// conicalFlask is a cone on a flat bottom.
var conicalFlask = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 31}, {1.5, 33.5}, {5, 34}, {72, 13}, {78, 12}, {98, 12}}, 74}
})

// beaker is a straight wall.
var beaker = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 28}, {1.5, 30.5}, {4, 31}, {82, 31}, {86, 33}}, 74}
})

// separatingFunnel is a pear on a stem; the stem below the tap holds nothing.
var separatingFunnel = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 1.8}, {6, 2.2}, {14, 7}, {28, 14.5}, {44, 21.5}, {58, 26}, {66, 27.5}, {72, 27.2}, {78, 24}, {82, 18}, {85, 9.5}, {96, 9.5}}, 83}
})

// filterFlask is a heavy conical flask with a short neck.
var filterFlask = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 32}, {2, 35}, {6, 35.5}, {62, 17}, {68, 14}, {88, 14}}, 64}
})

// cylinder is a measuring cylinder.
var cylinder = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 12}, {1, 13}, {96, 13}, {98, 14.5}}, 86}
})

// narrowBottle holds liquids: shoulders and a narrow neck.
var narrowBottle = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 27}, {2, 29.5}, {5, 30}, {58, 30}, {66, 27.5}, {72, 21}, {76, 13}, {78, 11.5}, {92, 11.5}}, 66}
})

// wideJar holds solids: a straight wall and a wide mouth.
var wideJar = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 27}, {2, 29.5}, {5, 30}, {66, 30}, {72, 27}, {75, 25}, {88, 25}}, 68}
})

// carboyCan is a waste container with a short neck.
var carboyCan = sync.OnceValue(func() profile {
	return profile{[]outlinePoint{{0, 32}, {2, 35}, {6, 36}, {76, 36}, {84, 31}, {88, 22}, {89, 12}, {97, 12}}, 84}
})

// wareProfile returns the outline of a kind of vessel, as the recipe and the
// equipment list name it. An unknown kind is drawn as a beaker, which promises
// nothing that a vessel doesn't have.
func wareProfile(kind string) profile {
	switch kind {
	case "round flask", "distilling flask", "flask":
		return roundFlask()
	case "conical flask", "receiver":
		return conicalFlask()
	case "separating funnel":
		return separatingFunnel()
	case "filter flask":
		return filterFlask()
	case "cylinder", "measuring cylinder":
		return cylinder()
	case "bottle":
		return narrowBottle()
	case "jar":
		return wideJar()
	case "carboy":
		return carboyCan()
	}
	return beaker()
}

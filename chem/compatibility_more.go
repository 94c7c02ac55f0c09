package chem

import (
	"slices"
	"strings"
	"sync"
)

// The supplementary rows name their two sides in words. Each wording has a
// predicate here; a row whose wording has none is caught by a test.

// side decides whether a reactant is one side of a supplementary row. all are
// the substances that are there, for rows that need a third.
type side func(r Reactant, all []Reactant) bool

type supplementRow struct {
	a, b         side
	nameA, nameB string
	codes        []string
	note, source string
}

var supplementRows = sync.OnceValue(func() []supplementRow {
	var rows []supplementRow
	sides := allSides()
	for _, file := range []string{"incompatibility.csv", "incompatibility_more.csv", "incompatibility_acids.csv"} {
		for _, row := range readTable(file) {
			a, okA := sides[row.text("group_a_name")]
			b, okB := sides[row.text("group_b_name")]
			if row.text("chart") != "SUP" || !okA || !okB || surroundings[row.text("group_b_name")] {
				continue
			}
			rows = append(rows, supplementRow{a, b, row.text("group_a_name"), row.text("group_b_name"),
				strings.Fields(row.text("codes")), row.text("note"), row.text("source")})
		}
	}
	return rows
})

// surroundings are sides that are no substance of a run: such rows are cautions
// for storage, not pairs.
var surroundings = map[string]bool{"air and light on storage": true, "air": true, "combustible wipes": true}

var sides = map[string]side{
	"carbonate or hydrogencarbonate salt": alone(isCarbonate),
	"any acid":                            anyGroup(1, 2, 3),
	"sulfite, bisulfite, metabisulfite":   alone(isSulfite),
	"thiosulfate":                         alone(isThiosulfate),
	"sulfite, bisulfite, thiosulfate":     alone(func(r Reactant) bool { return isSulfite(r) || isThiosulfate(r) }),
	"hypochlorite":                        alone(isHypochlorite),
	"chlorite":                            alone(func(r Reactant) bool { return named(r, "chlorite") && !isHypochlorite(r) }),
	"primary or secondary alcohol":        anyGroup(4),
	"acetone or other methyl ketone":      anyGroup(19),
	"ammonia, amines":                     alone(func(r Reactant) bool { return inGroup(r, 7) || named(r, "ammoni") }),
	"chromate, dichromate, CrO3":          alone(isChromateVI),
	"alcohol, aldehyde, ketone, ether, ester, paper, solvent": anyGroup(4, 5, 13, 14, 16, 19, 28, 29, 101),
	"hydrochloric acid or chloride + conc. sulfuric acid":     hydrogenChloride,
	"CrO3 or chromic acid":                                    alone(func(r Reactant) bool { return named(r, "chromium trioxide", "chromium(VI) oxide", "chromic acid") }),
	"acetic acid or acetic anhydride":                         alone(func(r Reactant) bool { return named(r, "acetic a") }),
	"permanganate":                                            alone(func(r Reactant) bool { return named(r, "permanganate") }),
	"concentrated sulfuric acid":                              alone(isSulfuricAcid),
	"hydrochloric acid":                                       alone(func(r Reactant) bool { return named(r, "hydrochloric acid", "hydrogen chloride") }),
	"alcohols, polyols, aldehydes, sulfites":                  alone(func(r Reactant) bool { return inGroup(r, 4, 5) || isSulfite(r) }),
	"nitric acid":                                             alone(func(r Reactant) bool { return named(r, "nitric acid") }),
	"alcohols, ketones, ethers, organic waste":                anyGroup(4, 14, 19, 101),
	"water":            alone(func(r Reactant) bool { return strings.EqualFold(r.Name, "water") }),
	"alcohols":         anyGroup(4),
	"sodium hydroxide": alone(func(r Reactant) bool { return named(r, "sodium hydroxide") }),
	"dichloromethane or chloroform + acetone": alone(func(r Reactant) bool { return named(r, "dichloromethane", "chloroform", "trichloromethane") }),
	"aluminium, zinc, tin":                    alone(func(r Reactant) bool { return isMetal(r, "aluminium", "zinc", "tin") }),
	"dichloromethane":                         alone(func(r Reactant) bool { return named(r, "dichloromethane") }),
	"alkali metals, strong bases, azides": alone(func(r Reactant) bool {
		return isMetal(r, "lithium", "sodium", "potassium") || named(r, "azide", "sodium hydroxide", "potassium hydroxide", "amide, sodium", "tert-butoxide")
	}),
	"ethers (peroxide formers)":          anyGroup(14),
	"aldehydes":                          anyGroup(5),
	"solid peroxide or oxidiser residue": anyGroup(30, 104),
	"air and light on storage":           nobody,
	"air":                                nobody,
	"combustible wipes":                  nobody,
}

func alone(f func(Reactant) bool) side { return func(r Reactant, _ []Reactant) bool { return f(r) } }

func anyGroup(groups ...int) side {
	return func(r Reactant, _ []Reactant) bool { return inGroup(r, groups...) }
}

func nobody(Reactant, []Reactant) bool { return false }

func inGroup(r Reactant, groups ...int) bool {
	return slices.ContainsFunc(r.Groups, func(g int) bool { return slices.Contains(groups, g) })
}

func named(r Reactant, parts ...string) bool {
	name := strings.ToLower(r.Name)
	return slices.ContainsFunc(parts, func(p string) bool { return strings.Contains(name, strings.ToLower(p)) })
}

func isMetal(r Reactant, names ...string) bool {
	return slices.Contains(names, strings.ToLower(strings.TrimSuffix(strings.TrimSuffix(r.Name, " powder"), " granules")))
}

// isCarbonate takes the salts; organic carbonates are in the ester group.
func isCarbonate(r Reactant) bool { return named(r, "carbonate") && !inGroup(r, 13) }

func isSulfite(r Reactant) bool {
	return named(r, "sulfite", "sulphite") && !isThiosulfate(r)
}

func isThiosulfate(r Reactant) bool { return named(r, "thiosulfate", "thiosulphate") }

func isHypochlorite(r Reactant) bool { return named(r, "hypochlorite") }

func isSulfuricAcid(r Reactant) bool {
	return named(r, "sulfuric acid", "sulphuric acid", "oleum") && !named(r, "chlorosulfuric", "fluorosulfuric")
}

// isChromateVI takes compounds of chromium(VI): chromates, dichromates, the
// trioxide, chromyl compounds and chromic acid.
func isChromateVI(r Reactant) bool {
	return named(r, "chromate", "chromium trioxide", "chromium(VI)", "chromic acid", "chromyl")
}

// hydrogenChloride takes hydrochloric acid, and a chloride salt where sulfuric
// acid is there too.
func hydrogenChloride(r Reactant, all []Reactant) bool {
	if named(r, "hydrochloric acid", "hydrogen chloride") {
		return true
	}
	salt := named(r, "sodium chloride", "potassium chloride", "calcium chloride", "ammonium chloride", "magnesium chloride", "lithium chloride")
	return salt && slices.ContainsFunc(all, isSulfuricAcid)
}

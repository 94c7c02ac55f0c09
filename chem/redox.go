package chem

import (
	"fmt"
	"strings"
	"sync"
)

// A RedoxAgent is an oxidant that may be left over, or a reductant that destroys
// it, with its half-reaction in acid.
type RedoxAgent struct {
	Name, CAS string
	Synonyms  []string
	Formula   Formula
	Half      string // half-equation
	Electrons int    // taken (oxidant) or given (reductant) per formula unit
	Protons   int    // H⁺ used per formula unit; below zero where they are set free
	// ReduceIn says in what the oxidant is to be reduced: acid, neutral or base.
	ReduceIn              string
	ReduceLow, ReduceHigh float64 // pH for the reduction
	// Metal is what the agent leaves as sludge; empty where it leaves none.
	Metal             string
	MetalAtoms        int
	Sludge            Formula
	HydroxidePerMetal int
	// SludgeLow and SludgeHigh are the pH between which the sludge is insoluble;
	// both 0 where there is no statement.
	SludgeLow, SludgeHigh float64
	Caution, Source       string
}

type redoxTable struct{ oxidants, reductants []RedoxAgent }

var redoxAgents = sync.OnceValue(func() redoxTable {
	var table redoxTable
	for _, r := range readTable("redox_agents.csv") {
		agent := RedoxAgent{
			Name: r.text("name"), CAS: r.text("cas"), Synonyms: r.list("synonyms"), Formula: mustFormula(r.text("formula")),
			Half: r.text("half_equation"), Electrons: int(r.must("electrons")), Protons: int(r.must("protons")),
			ReduceIn: r.text("reduce_in"), Metal: r.text("metal"), Caution: r.text("caution"), Source: r.text("source"),
		}
		if agent.Metal != "" {
			agent.MetalAtoms = int(r.must("metal_atoms"))
			agent.Sludge = mustFormula(r.text("sludge_formula"))
			agent.HydroxidePerMetal = int(r.must("hydroxide_per_metal"))
		}
		agent.ReduceLow, _ = r.number("reduce_pH_low")
		agent.ReduceHigh, _ = r.number("reduce_pH_high")
		agent.SludgeLow, _ = r.number("sludge_pH_low")
		agent.SludgeHigh, _ = r.number("sludge_pH_high")
		if r.text("role") == "oxidant" {
			table.oxidants = append(table.oxidants, agent)
		} else {
			table.reductants = append(table.reductants, agent)
		}
	}
	return table
})

// mustFormula parses a formula of an embedded table; it panics on a wrong one.
func mustFormula(text string) Formula {
	formula, err := ParseFormula(text)
	if err != nil {
		panic("chem: embedded table: " + err.Error())
	}
	return formula
}

// OxidantOf finds an oxidant by name, synonym, formula or CAS number. The error
// wraps ErrNoData and lists the oxidants there are.
func OxidantOf(key string) (RedoxAgent, error) {
	return findAgent("oxidant", key, redoxAgents().oxidants)
}

// ReductantOf finds a reductant by name, synonym, formula or CAS number. The
// error wraps ErrNoData and lists the reductants there are.
func ReductantOf(key string) (RedoxAgent, error) {
	return findAgent("reductant", key, redoxAgents().reductants)
}

func findAgent(role, key string, agents []RedoxAgent) (RedoxAgent, error) {
	want := strings.TrimSpace(key)
	var names []string
	for _, word := range []string{want, casOf(want)} {
		for _, agent := range agents {
			if agent.called(word) {
				return agent, nil
			}
		}
	}
	for _, agent := range agents {
		names = append(names, agent.Name)
	}
	return RedoxAgent{}, &DataError{Of: fmt.Sprintf("%s %q", role, key), Err: ErrNoData, Limit: "there are " + strings.Join(names, ", "), Remedy: "name one of them"}
}

// called says whether a word names the agent.
func (a RedoxAgent) called(want string) bool {
	if strings.EqualFold(a.Name, want) || (a.CAS != "" && a.CAS == want) {
		return true
	}
	for _, synonym := range a.Synonyms {
		if strings.EqualFold(synonym, want) {
			return true
		}
	}
	return formulaKey(a.Formula.String()) == formulaKey(want)
}

// An OxidantUse is what takes electrons from an oxidant in a reaction.
type OxidantUse struct {
	Amount    Amount // that reacted: charged times conversion
	Electrons int    // it gives: 2 alcohol to aldehyde or ketone, 4 primary alcohol to acid
}

// OxidantLeft returns the oxidant that a reaction leaves over,
//
//	n(left) = n(charged) − Σ n(i) · e(i) / e(oxidant)
//
// where e are the electrons per molecule. The error wraps ErrImpossible where
// the uses ask for more oxidant than was charged, and names the shortage.
func OxidantLeft(charged Amount, electrons int, uses ...OxidantUse) (Amount, error) {
	of := "oxidant left over"
	if err := firstError(mustBePositive(of, "amount of oxidant", charged), mustBePositive(of, "electrons per oxidant", float64(electrons))); err != nil {
		return 0, err
	}
	taken := 0.0
	for _, use := range uses {
		if !(use.Amount >= 0) || !Finite(use.Amount) || use.Electrons < 0 {
			return 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "amounts and electrons must not be below zero"}
		}
		taken += float64(use.Amount) * float64(use.Electrons)
	}
	left := charged - Amount(taken/float64(electrons))
	if left < -1e-12*charged { // rounding of an exact fit counts as none left
		return 0, &DataError{
			Of: of, Err: ErrImpossible,
			Limit:  fmt.Sprintf("%.4g mol are used, %.4g mol were charged", taken/float64(electrons), float64(charged)),
			Remedy: "charge more oxidant or lower the conversion",
		}
	}
	return max(left, 0), nil
}

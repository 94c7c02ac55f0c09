package chem

import (
	"fmt"
	"slices"
	"strings"
	"sync"
)

// A DryingAgent is a solid that binds water out of an organic liquid.
type DryingAgent struct {
	Name, CAS, Formula, Hydrate string
	// Theoretical is the capacity of the highest hydrate, Low and High the
	// range met in practice, in gram water per gram agent; 0 means no data.
	Theoretical, Low, High float64
	// Residual is the water left in dried air in mg/L, the usual measure of
	// intensity; HasResidual is false where there is no data.
	Residual         float64
	HasResidual      bool
	Speed, Intensity string
	Suitable         []string // classes the table recommends it for
	Incompatible     []string // classes it must not meet
	Notes, Source    string
}

var dryingAgents = sync.OnceValue(func() []DryingAgent {
	var agents []DryingAgent
	for _, row := range withMore("drying_agents") {
		agent := DryingAgent{
			Name: row.text("agent"), CAS: row.text("cas"), Formula: row.text("formula"), Hydrate: row.text("hydrate_formed"),
			Speed: row.text("speed"), Intensity: row.text("intensity"),
			Suitable: row.list("suitable_for"), Incompatible: row.list("incompatible_with"),
			Notes: row.text("notes"), Source: row.text("source"),
		}
		agent.Theoretical, _ = row.number("theoretical_capacity_g_water_per_g")
		agent.Low, _ = row.number("practical_capacity_low_g_water_per_g")
		agent.High, _ = row.number("practical_capacity_high_g_water_per_g")
		agent.Residual, agent.HasResidual = row.number("residual_water_mg_per_L_air")
		agents = append(agents, agent)
	}
	return agents
})

// DryingAgents returns all agents of the table in its order.
func DryingAgents() []DryingAgent { return slices.Clone(dryingAgents()) }

// DryingAgentOf finds an agent by name, synonym, formula or CAS number. The name
// of a salt may carry "anhydrous". The error wraps ErrNoData and lists the agents
// there are.
func DryingAgentOf(nameOrCAS string) (DryingAgent, error) {
	want, cas := agentWords(nameOrCAS), casOf(nameOrCAS)
	var names []string
	for _, agent := range dryingAgents() {
		if want == agentWords(agent.Name) || cas == agent.CAS || (agent.Formula != "" && nameOrCAS == agent.Formula) {
			return agent, nil
		}
		names = append(names, agent.Name)
	}
	if of, ok := hydrateOfAgent(nameOrCAS); ok {
		return DryingAgent{}, &DataError{
			Of: fmt.Sprintf("drying with %q", nameOrCAS), Err: ErrImpossible,
			Limit: "it holds its water already", Remedy: "take anhydrous " + of.Name,
		}
	}
	return DryingAgent{}, &DataError{
		Of: fmt.Sprintf("drying agent %q", nameOrCAS), Err: ErrNoData,
		Limit: "there are " + strings.Join(names, ", "), Remedy: "name one of them or give its capacity in g water per g",
	}
}

// hydrateOfAgent finds the agent that a substance is a hydrate of.
func hydrateOfAgent(name string) (DryingAgent, bool) {
	text := name
	if s, ok := LookupSubstance(name); ok {
		text = s.Formula
	}
	f, err := ParseFormula(text)
	if err != nil || f.Waters() == 0 {
		return DryingAgent{}, false
	}
	for _, agent := range dryingAgents() {
		if dry, err := ParseFormula(agent.Formula); err == nil && dry.Hill() == f.Anhydrous().Hill() {
			return agent, true
		}
	}
	return DryingAgent{}, false
}

// agentWords brings spellings of an agent's name together: "Molecular sieves 3 Å"
// is "molecular sieve 3a", "MgSO4, anhydrous" loses its last word.
func agentWords(name string) string {
	name = strings.NewReplacer("sieves", "sieve", "å", "a", ",", "", "copper sulfate", "copper(ii) sulfate").Replace(strings.ToLower(name))
	words := strings.Fields(name)
	words = slices.DeleteFunc(words, func(word string) bool { return word == "anhydrous" || word == "molecular" })
	slices.Sort(words)
	return strings.ReplaceAll(strings.Join(words, " "), "3 a", "3a")
}

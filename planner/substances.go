package planner

// SubstancesOf lists what a run of the recipe may draw on: every substance its
// charges and hidden needs ask for, by registry number and name, what may stand
// for it, and water. A shelf that has the bottles of these substances, and all
// its other lists whole, gives the same plan as the whole shelf. The error is
// that of Compile.
func SubstancesOf(r *Recipe) ([]string, error) {
	p, err := r.compiled()
	if err != nil {
		return nil, err
	}
	names := []string{waterName}
	seen := map[string]bool{waterName: true, "": true}
	add := func(name string) {
		if !seen[name] {
			seen[name] = true
			names = append(names, name)
		}
	}
	for i := range p.asks {
		add(p.asks[i].CAS)
		add(p.asks[i].Substance)
		for _, s := range p.asks[i].Accept.Substitutes {
			add(s.Substance)
		}
	}
	return names, nil
}

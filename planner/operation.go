package planner

// operation is a step kind as the file has it.
type operation interface {
	// read takes the step's own keys.
	read(f *fields)
	// names visits every vessel, reaction and substance the step names.
	names(visit func(kind, name string, at place))
	// compile looks everything up once, so that run needs no names.
	compile(c *compiler) (runner, error)
}

// runner carries a step out on the vessels of a workspace.
type runner interface {
	run(w *Workspace) error
}

// StepKinds returns the step kinds in the order in which a run goes through them.
func StepKinds() []string {
	return []string{
		"charge", "make-up", "cool", "heat", "hold", "add", "react", "co-distil", "separate", "wash", "neutralise",
		"boil-down", "acidify", "extract", "dry", "filter", "rinse", "strip", "distil", "quench", "discard",
	}
}

// newOperation returns an empty operation of a kind, or nil if there is no such kind.
func newOperation(kind string) operation {
	switch kind {
	case "charge":
		return &chargeOp{}
	case "make-up":
		return &makeUpOp{}
	case "cool":
		return &temperOp{kind: kind}
	case "heat":
		return &temperOp{kind: kind}
	case "hold":
		return &holdOp{}
	case "add":
		return &addOp{}
	case "react":
		return &reactOp{}
	case "co-distil":
		return &coDistilOp{}
	case "separate":
		return &separateOp{}
	case "wash":
		return &washOp{}
	case "neutralise":
		return &neutraliseOp{}
	case "boil-down":
		return &boilDownOp{}
	case "acidify":
		return &acidifyOp{}
	case "extract":
		return &extractOp{}
	case "dry":
		return &dryOp{}
	case "filter":
		return &filterOp{}
	case "rinse":
		return &rinseOp{}
	case "strip":
		return &stripOp{}
	case "distil":
		return &distilOp{}
	case "quench":
		return &quenchOp{}
	case "discard":
		return &discardOp{}
	}
	return nil
}

package planner

import "sync"

// compiledOnce keeps the program of a recipe, which is never changed once it
// has been read, so that every plan of it needn't compile it anew.
type compiledOnce struct {
	do      sync.Once
	program *Program
	err     error
}

// compiled returns the recipe's program. Any number of goroutines may ask. A
// copy of a recipe may have been changed and is compiled by itself.
func (r *Recipe) compiled() (*Program, error) {
	if r.once == nil {
		return Compile(r)
	}
	r.once.do.Do(func() { r.once.program, r.once.err = Compile(r) })
	if r.once.program != nil && r.once.program.Recipe != r {
		return Compile(r)
	}
	return r.once.program, r.once.err
}

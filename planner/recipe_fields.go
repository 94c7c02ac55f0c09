package planner

import (
	"fmt"
	"slices"
	"strings"

	"github.com/goccy/go-yaml/ast"
	"github.com/goccy/go-yaml/token"
)

// fields reads one mapping of a recipe file. Every getter notes the key as
// known and every fault with its place, so that a person fixing the file sees
// all of them at once.
type fields struct {
	file   string
	errs   *RecipeErrors
	at     *token.Position
	what   string // what the mapping describes, for messages
	values map[string]ast.Node
	keys   []*ast.MappingValueNode
	known  []string
}

// place is where something stands in a recipe file.
type place struct {
	file         string
	line, column int
}

func placeOf(file string, n ast.Node) place {
	p := n.GetToken().Position
	return place{file, p.Line, p.Column}
}

// newFields reads n as a mapping; a node of another kind is a fault and gives
// an empty mapping.
func newFields(file string, errs *RecipeErrors, n ast.Node, what string) *fields {
	f := &fields{file: file, errs: errs, what: what, values: map[string]ast.Node{}, at: n.GetToken().Position}
	switch n := n.(type) {
	case *ast.MappingNode:
		f.keys = n.Values
	case *ast.MappingValueNode:
		f.keys = []*ast.MappingValueNode{n}
	default:
		f.faultAt(n, fmt.Sprintf("%s is %q", what, nodeText(n)), "a list of keys with values")
	}
	for _, pair := range f.keys {
		f.values[pair.Key.GetToken().Value] = pair.Value
	}
	if len(f.keys) > 0 {
		f.at = f.keys[0].Key.GetToken().Position
	}
	return f
}

func (f *fields) faultAt(n ast.Node, what, expected string) {
	f.fault(n.GetToken().Position, what, expected)
}

func (f *fields) fault(at *token.Position, what, expected string) {
	f.errs.Faults = append(f.errs.Faults, RecipeFault{f.file, at.Line, at.Column, shortened(what), expected})
}

// node returns the value of key; a missing one that is needed is a fault.
func (f *fields) node(key string, needed bool) ast.Node {
	f.known = append(f.known, key)
	n := f.values[key]
	if n == nil && needed {
		f.fault(f.at, fmt.Sprintf("%s has no %q", f.what, key), fmt.Sprintf("a line %s: …", key))
	}
	return n
}

// nodeText returns the text of a scalar, or "" for anything else.
func nodeText(n ast.Node) string {
	switch n := n.(type) {
	case *ast.StringNode:
		return n.Value
	case *ast.LiteralNode:
		return strings.TrimSpace(n.Value.Value)
	case *ast.IntegerNode, *ast.FloatNode, *ast.BoolNode:
		return n.GetToken().Value
	}
	return ""
}

// text returns the scalar of key.
func (f *fields) text(key string, needed bool) string {
	n := f.node(key, needed)
	if n == nil {
		return ""
	}
	s := strings.TrimSpace(nodeText(n))
	if s == "" {
		f.faultAt(n, fmt.Sprintf("%q is no text", key), "a word or a number")
	}
	return s
}

// flag returns whether key is yes.
func (f *fields) flag(key string) bool {
	n := f.node(key, false)
	if n == nil {
		return false
	}
	switch nodeText(n) {
	case "yes", "true":
		return true
	case "no", "false":
		return false
	}
	f.faultAt(n, fmt.Sprintf("%s %q", key, nodeText(n)), "yes or no")
	return false
}

// texts returns a list of scalars; a single scalar counts as a list of one.
func (f *fields) texts(key string) []string {
	n := f.node(key, false)
	if n == nil {
		return nil
	}
	seq, ok := n.(*ast.SequenceNode)
	if !ok {
		return []string{nodeText(n)}
	}
	var list []string
	for _, v := range seq.Values {
		if s := nodeText(v); s != "" {
			list = append(list, s)
			continue
		}
		f.faultAt(v, fmt.Sprintf("an entry of %q is no text", key), "a word or a sentence")
	}
	return list
}

// each calls do with every mapping of a list.
func (f *fields) each(key string, needed bool, what string, do func(*fields)) {
	n := f.node(key, needed)
	if n == nil {
		return
	}
	seq, ok := n.(*ast.SequenceNode)
	if !ok {
		f.faultAt(n, fmt.Sprintf("%q is no list", key), "a list, each entry beginning with a dash")
		return
	}
	for _, v := range seq.Values {
		g := newFields(f.file, f.errs, v, what)
		do(g)
		g.done()
	}
}

// entries calls do with the key and mapping of every entry of a mapping of mappings.
func (f *fields) entries(key string, needed bool, what string, do func(name string, g *fields)) {
	n := f.node(key, needed)
	if n == nil {
		return
	}
	outer := newFields(f.file, f.errs, n, key)
	for _, pair := range outer.keys {
		name := pair.Key.GetToken().Value
		g := newFields(f.file, f.errs, pair.Value, what+" "+name)
		g.at = pair.Key.GetToken().Position
		do(name, g)
		g.done()
	}
}

// inner returns the mapping under key, or nil.
func (f *fields) inner(key string, needed bool) *fields {
	n := f.node(key, needed)
	if n == nil {
		return nil
	}
	return newFields(f.file, f.errs, n, key)
}

// done notes every key that nobody asked for.
func (f *fields) done() {
	for _, pair := range f.keys {
		key := pair.Key.GetToken().Value
		if slices.Contains(f.known, key) {
			continue
		}
		f.fault(pair.Key.GetToken().Position, fmt.Sprintf("unknown key %q in %s", key, f.what), "one of "+f.knownList())
	}
}

func (f *fields) knownList() string {
	known := slices.Compact(slices.Sorted(slices.Values(f.known)))
	return strings.Join(known, ", ")
}

// take reads the value of key with parse; what doesn't parse is a fault that
// quotes it. The second result is false if there is none.
func take[Q any](f *fields, key string, needed bool, parse func(string) (Q, error), expected string) (Q, bool) {
	var zero Q
	n := f.node(key, needed)
	if n == nil {
		return zero, false
	}
	q, err := parse(nodeText(n))
	if err != nil {
		f.faultAt(n, fmt.Sprintf("%s %q: %s", key, nodeText(n), reason(err)), expected)
		return zero, false
	}
	return q, true
}

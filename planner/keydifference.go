package planner

import (
	"fmt"
	"slices"
	"strings"

	"github.com/goccy/go-yaml/ast"
)

// KeyChange is one key of a recipe that two versions don't have alike.
type KeyChange struct {
	// Key leads to it from the top, such as "steps › reflux › time".
	Key string
	// Was and Is are its values; "" where the key isn't in that version.
	Was, Is string
	Added   bool
	Removed bool
}

// KeyDifference compares two versions of a recipe's text key by key, so that
// layout, comments and quotes make no difference. Entries of a list are told
// apart by their name, not by their number, so that a step put in changes nothing
// in those after it; one that was moved is said to be. The error is that of
// ParseRecipe for a text that is no YAML.
func KeyDifference(before, after string) ([]KeyChange, error) {
	a, err := keysOf("before", before)
	if err != nil {
		return nil, err
	}
	b, err := keysOf("after", after)
	if err != nil {
		return nil, err
	}
	var list []KeyChange
	for _, key := range mergedOrder(a.order, b.order) {
		was, had := a.values[key]
		is, has := b.values[key]
		switch {
		case had && has && was == is:
		case had && has:
			list = append(list, KeyChange{Key: key, Was: was, Is: is})
		case has:
			list = append(list, KeyChange{Key: key, Is: is, Added: true})
		default:
			list = append(list, KeyChange{Key: key, Was: was, Removed: true})
		}
	}
	for _, key := range a.lists {
		list = append(list, moved(key, a.labels[key], b.labels[key])...)
	}
	return list, nil
}

// recipeKeys are the scalars of a recipe text by the way to them.
type recipeKeys struct {
	values map[string]string
	order  []string
	// labels are the names of the entries of every list of mappings, in order.
	labels map[string][]string
	lists  []string
}

func keysOf(file, text string) (*recipeKeys, error) {
	root, fault := parseYAML(file, []byte(text))
	if fault != nil {
		return nil, &RecipeErrors{Faults: []RecipeFault{*fault}}
	}
	k := &recipeKeys{values: map[string]string{}, labels: map[string][]string{}}
	k.walk("", root)
	return k, nil
}

func (k *recipeKeys) walk(way string, n ast.Node) {
	switch n := n.(type) {
	case *ast.MappingNode:
		for _, pair := range n.Values {
			k.walk(wayTo(way, pair.Key.GetToken().Value), pair.Value)
		}
	case *ast.MappingValueNode:
		k.walk(wayTo(way, n.Key.GetToken().Value), n.Value)
	case *ast.SequenceNode:
		k.walkList(way, n)
	default:
		k.put(way, nodeText(n))
	}
}

func (k *recipeKeys) put(way, value string) {
	if _, there := k.values[way]; !there {
		k.order = append(k.order, way)
	}
	k.values[way] = value
}

// walkList takes a list of mappings entry by entry, and a list of texts as one
// value.
func (k *recipeKeys) walkList(way string, n *ast.SequenceNode) {
	var texts []string
	seen := map[string]int{}
	for i, v := range n.Values {
		label := labelOf(v)
		if label == "" && nodeText(v) != "" {
			texts = append(texts, nodeText(v))
			continue
		}
		if label == "" {
			label = fmt.Sprintf("entry %d", i+1)
		}
		seen[label]++
		if seen[label] > 1 {
			label = fmt.Sprintf("%s, number %d", label, seen[label])
		}
		if k.labels[way] == nil {
			k.lists = append(k.lists, way)
		}
		k.labels[way] = append(k.labels[way], label)
		k.walk(wayTo(way, label), v)
	}
	if texts != nil {
		k.put(way, strings.Join(texts, "; "))
	}
}

// labelOf is what an entry of a list is known by.
func labelOf(n ast.Node) string {
	var pairs []*ast.MappingValueNode
	switch n := n.(type) {
	case *ast.MappingNode:
		pairs = n.Values
	case *ast.MappingValueNode:
		pairs = []*ast.MappingValueNode{n}
	}
	for _, by := range []string{"name", "substance", "reaction"} {
		for _, pair := range pairs {
			if text := nodeText(pair.Value); pair.Key.GetToken().Value == by && text != "" {
				return text
			}
		}
	}
	return ""
}

func wayTo(way, key string) string {
	if way == "" {
		return key
	}
	return way + " › " + key
}

// mergedOrder is the order of b, with what only a has after what it followed there.
func mergedOrder(a, b []string) []string {
	merged := slices.Clone(b)
	in := make(map[string]bool, len(b))
	for _, key := range b {
		in[key] = true
	}
	after := ""
	for _, key := range a {
		if !in[key] {
			merged = slices.Insert(merged, slices.Index(merged, after)+1, key)
			in[key] = true
		}
		after = key
	}
	return merged
}

// moved lists the entries of a list that both versions have, in another order.
func moved(key string, a, b []string) []KeyChange {
	inBoth := func(list, other []string) []string {
		return slices.DeleteFunc(slices.Clone(list), func(s string) bool { return !slices.Contains(other, s) })
	}
	a, b = inBoth(a, b), inBoth(b, a)
	common := commonLines(a, b)
	var list []KeyChange
	for i, j := 0, 0; i < len(a) && j < len(b); {
		switch {
		case a[i] == b[j]:
			i, j = i+1, j+1
		case common[i+1][j] >= common[i][j+1]:
			to := slices.Index(b, a[i])
			list = append(list, KeyChange{Key: wayTo(key, a[i]), Was: standsAfter(a, i), Is: standsAfter(b, to)})
			i++
		default:
			j++
		}
	}
	return list
}

func standsAfter(list []string, i int) string {
	if i == 0 {
		return "first"
	}
	return "after " + list[i-1]
}

package chem

import (
	"strings"
)

// Span is a stretch of a formula that stands on one line: Level is -1 for a
// subscript, 0 for the line itself and +1 for a superscript.
type Span struct {
	Text  string
	Level int
}

// Rich returns the formula as spans to be set on a page or paper, with true
// subscripts, raised charges and mass numbers, a centred dot and a true minus.
// Neighbours on one line are joined.
func (f Formula) Rich() []Span {
	var spans []Span
	f.tokens(func(kind tokenKind, text string) {
		level := 0
		switch kind {
		case tokenCount:
			level = -1
		case tokenCharge:
			level, text = 1, strings.ReplaceAll(text, "-", "−")
		case tokenMassNumber:
			level = 1
		case tokenState:
			text = "\u2009" + text // thin space
		}
		if last := len(spans) - 1; last >= 0 && spans[last].Level == level {
			spans[last].Text += text
			return
		}
		spans = append(spans, Span{text, level})
	})
	return spans
}

// String returns the formula in plain text that ParseFormula reads as the same
// formula: "Na2Cr2O7·2H2O", "[Fe(CN)6]^4-", "[13C]O2".
func (f Formula) String() string {
	var b strings.Builder
	number := ""
	f.tokens(func(kind tokenKind, text string) {
		switch kind {
		case tokenCount:
			if strings.ContainsAny(text, "./") {
				text = "_{" + text + "}"
			}
		case tokenCharge:
			text = "^" + text
		case tokenMassNumber:
			number = text
			return
		case tokenSymbol:
			if number != "" {
				text, number = "["+number+text+"]", ""
			}
		}
		b.WriteString(text)
	})
	return b.String()
}

// tokens goes through the formula's text once more, telling what each stretch is.
func (f Formula) tokens(emit func(tokenKind, string)) {
	if f.text == "" {
		return
	}
	var again Formula
	if err := again.read(f.text, emit); err != nil {
		panic("chem: a parsed formula doesn't parse again: " + err.Error())
	}
}

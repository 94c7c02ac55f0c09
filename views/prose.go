package views

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// unitWords are the units that stand after numbers in the planner's sentences.
var unitWords = []string{"%", "°C", "K", "kg", "g", "mg", "µg", "L", "mL", "µL", "mol", "mmol", "kJ", "kJ/mol", "W", "kPa",
	"min", "h", "days", "g/mol", "g/mL", "g/g", "mol/L", "mL/g", "ppm"}

// bound keeps numbers and their units on one line: the space between them
// becomes the narrow one that doesn't break.
func bound(text string) string {
	if !strings.Contains(text, " ") {
		return text
	}
	var b strings.Builder
	for {
		i := strings.IndexByte(text, ' ')
		if i < 0 {
			b.WriteString(text)
			return b.String()
		}
		b.WriteString(text[:i])
		if i > 0 && text[i-1] >= '0' && text[i-1] <= '9' && slices.Contains(unitWords, firstWord(text[i+1:])) {
			b.WriteString(narrow)
		} else {
			b.WriteByte(' ')
		}
		text = text[i+1:]
	}
}

// firstWord is the text up to the next space, without the punctuation at its end.
func firstWord(text string) string {
	word, _, _ := strings.Cut(text, " ")
	return strings.TrimRight(word, ".,;:)]")
}

// sentence makes a sentence of a text that begins small: a capital, numbers
// bound to their units, a full stop.
func sentence(text string) string {
	if text == "" {
		return ""
	}
	head := bound(capitalised(text))
	if strings.HasSuffix(head, ".") || strings.HasSuffix(head, "?") {
		return head
	}
	return head + "."
}

// capitalised makes the first letter a capital, but leaves "pH" and "µg" alone.
func capitalised(text string) string {
	first, size := utf8.DecodeRuneInString(text)
	second, _ := utf8.DecodeRuneInString(text[size:])
	if first == 'µ' || unicode.IsUpper(second) {
		return text
	}
	return string(unicode.ToUpper(first)) + text[size:]
}

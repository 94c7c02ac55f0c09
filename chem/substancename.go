package chem

import (
	"strings"
	"unicode/utf8"
)

// plainName appends a name to buf in the form in which names are compared: small
// letters, without blanks and hyphens, without the word anhydrous, in IUPAC
// spelling of sulfur, aluminium and caesium, and hydrates by their word.
func plainName(buf []byte, name string) []byte {
	begin := len(buf)
	for i := 0; i < len(name); {
		c := name[i]
		if c >= utf8.RuneSelf {
			r, size := utf8.DecodeRuneInString(name[i:])
			buf = appendPlainRune(buf, r)
			i += size
			continue
		}
		i++
		switch {
		case c == ' ' || c == '-' || c == '\t':
		case c >= 'A' && c <= 'Z':
			buf = append(buf, c+'a'-'A')
		default:
			buf = append(buf, c)
		}
	}
	return respell(buf, begin)
}

func appendPlainRune(buf []byte, r rune) []byte {
	switch r {
	case '\u00a0', '\u2009', '\u202f', '‐', '‑', '‒', '–', '—', '−':
		return buf
	case '′', '’', '‘':
		return append(buf, '\'')
	case 'α':
		return append(buf, "alpha"...)
	case 'β':
		return append(buf, "beta"...)
	case 'γ':
		return append(buf, "gamma"...)
	case '·', '•', '⋅', '.':
		return append(buf, '.')
	case '₀', '₁', '₂', '₃', '₄', '₅', '₆', '₇', '₈', '₉':
		return append(buf, byte('0'+r-'₀'))
	}
	return utf8.AppendRune(buf, r)
}

// spellings are other spellings and the one used for comparing; each is tried
// only where its first letters occur.
var spellings = [...][2]string{
	{"sulph", "sulf"}, {"aluminum", "aluminium"}, {"cesium", "caesium"},
	{"(anhydrous)", ""}, {",anhydrous", ""}, {"anhydrous", ""},
	{"monohydrate", "1hydrate"}, {"dihydrate", "2hydrate"}, {"trihydrate", "3hydrate"},
	{"tetrahydrate", "4hydrate"}, {"pentahydrate", "5hydrate"}, {"hexahydrate", "6hydrate"},
	{"heptahydrate", "7hydrate"}, {"octahydrate", "8hydrate"}, {"nonahydrate", "9hydrate"},
	{"decahydrate", "10hydrate"}, {"dodecahydrate", "12hydrate"}, {"octadecahydrate", "18hydrate"},
	{"hemihydrate", "0.5hydrate"}, {"sesquihydrate", "1.5hydrate"},
	{".10h2o", "10hydrate"}, {".12h2o", "12hydrate"}, {".18h2o", "18hydrate"},
	{".2h2o", "2hydrate"}, {".3h2o", "3hydrate"}, {".4h2o", "4hydrate"}, {".5h2o", "5hydrate"},
	{".6h2o", "6hydrate"}, {".7h2o", "7hydrate"}, {".8h2o", "8hydrate"}, {".9h2o", "9hydrate"}, {".h2o", "1hydrate"},
}

// respell puts the spellings into one form. Names without any of the tell-tale
// letters, nearly all, are left after one pass.
func respell(buf []byte, begin int) []byte {
	name := buf[begin:]
	if !mayRespell(name) {
		return buf
	}
	text := string(name)
	text = strings.ReplaceAll(text, "octadecahydrate", "18hydrate")
	text = strings.ReplaceAll(text, "dodecahydrate", "12hydrate")
	for _, s := range spellings {
		text = strings.ReplaceAll(text, s[0], s[1])
	}
	return append(buf[:begin], text...)
}

// mayRespell reports whether a name holds "ph" after "l", "hydr", "minum",
// "cesium" or a water behind a dot.
func mayRespell(name []byte) bool {
	for i := 0; i+4 <= len(name); i++ {
		switch name[i] {
		case 'u':
			if name[i+1] == 'l' && name[i+2] == 'p' {
				return true
			}
		case 'h':
			if name[i+1] == 'y' && name[i+2] == 'd' && name[i+3] == 'r' {
				return true
			}
		case 'i':
			if name[i+1] == 'n' && name[i+2] == 'u' && name[i+3] == 'm' {
				return true
			}
		case 'c':
			if name[i+1] == 'e' && name[i+2] == 's' && name[i+3] == 'i' {
				return true
			}
		case '.':
			return true
		}
	}
	return false
}

// cutStrength takes a word on the strength off a name: "conc. sulfuric acid". It
// doesn't take off fuming, which is another thing.
func cutStrength(key string) (string, bool) {
	for _, word := range []string{"concentrated ", "conc. ", "conc ", "dilute ", "dil. ", "dil "} {
		if len(key) > len(word) && strings.EqualFold(key[:len(word)], word) {
			return strings.TrimSpace(key[len(word):]), true
		}
	}
	return key, false
}

// withoutCharges takes the oxidation numbers out of a name: "copper(II) sulfate" is
// "copper sulfate".
func withoutCharges(name string) string {
	for _, charge := range []string{"(I)", "(II)", "(III)", "(IV)", "(V)", "(VI)", "(VII)"} {
		name = strings.ReplaceAll(name, charge, "")
	}
	return name
}

// cutAnhydrous takes the word off a formula: "MgSO4, anhydrous".
func cutAnhydrous(key string) string {
	const word = "anhydrous"
	key = strings.TrimSpace(key)
	if len(key) > len(word) && strings.EqualFold(key[len(key)-len(word):], word) {
		return strings.TrimRight(key[:len(key)-len(word)], " ,")
	}
	if len(key) > len(word) && strings.EqualFold(key[:len(word)], word) {
		return strings.TrimLeft(key[len(word):], " ")
	}
	return key
}

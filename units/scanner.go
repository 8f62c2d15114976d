package units

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// A scanner steps through a text.
type scanner struct {
	text string
	pos  int // in bytes
}

// fail returns an error at the current place.
func (s *scanner) fail(kind error, expected string) *ParseError {
	found := s.symbol()
	if found == "" {
		_, n := utf8.DecodeRuneInString(s.text[s.pos:])
		found = s.text[s.pos : s.pos+n]
	}
	if found == "," {
		expected += " (a decimal comma is not one)"
	}
	return &ParseError{Text: s.text, Pos: s.pos, Found: found, Expected: expected, Err: kind}
}

// rest returns what has not been read.
func (s *scanner) rest() string { return s.text[s.pos:] }

// end reports whether everything has been read.
func (s *scanner) end() bool { return s.pos == len(s.text) }

// take steps over the first of the pieces that the text continues with, and
// reports whether there is one.
func (s *scanner) take(pieces ...string) bool {
	for _, piece := range pieces {
		if strings.HasPrefix(s.rest(), piece) {
			s.pos += len(piece)
			return true
		}
	}
	return false
}

// space steps over white space.
func (s *scanner) space() {
	s.pos = len(s.text) - len(strings.TrimLeftFunc(s.rest(), unicode.IsSpace))
}

// symbol returns the symbol at the current place, "" if there is none.
func (s *scanner) symbol() string {
	rest := s.rest()
	for i, r := range rest {
		if !unicode.IsLetter(r) && !strings.ContainsRune("°℃℉%‰_", r) {
			return rest[:i]
		}
	}
	return rest
}

// minus steps over a minus sign and returns it in ASCII.
func (s *scanner) minus() string {
	if s.take("-", "−") {
		return "-"
	}
	return ""
}

// digits steps over digits and returns them.
func (s *scanner) digits() string {
	rest := s.rest()
	n := 0
	for n < len(rest) && '0' <= rest[n] && rest[n] <= '9' {
		n++
	}
	s.pos += n
	return rest[:n]
}

// superscripts steps over a whole number in superscripts and returns it in
// ASCII, "" if there is none.
func (s *scanner) superscripts() string {
	digits, size := "", 0
	for i, r := range s.rest() {
		if r == '⁻' && i == 0 {
			digits = "-"
			continue
		}
		d := superscriptDigit(r)
		if d < 0 {
			break
		}
		digits += string(rune('0' + d))
		size = i + utf8.RuneLen(r)
	}
	s.pos += size
	if size == 0 {
		return ""
	}
	return digits
}

func superscriptDigit(r rune) int {
	switch {
	case r == '¹':
		return 1
	case r == '²' || r == '³':
		return int(r-'²') + 2
	case r == '⁰' || '⁴' <= r && r <= '⁹':
		return int(r - '⁰')
	}
	return -1
}

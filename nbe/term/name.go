package term

import (
	"unicode"
	"unicode/utf8"
)

// What may be a name. A name is any run of characters other than white space,
// parentheses, semicolons and double quotes that is no head word and does not
// look like a number; the reader, the writer and hosts ask here.

// headWords holds every word of the notation; it is never written after initialisation.
var headWords = func() map[string]bool {
	words := map[string]bool{}
	for _, s := range Words() {
		words[s.Word] = true
	}
	for _, w := range ScriptWords() {
		words[w] = true
	}
	return words
}()

// IsHeadWord reports whether s is a head word of the notation (those of
// scripts included), which no name can be. Words that host formers bring are
// not known here.
func IsHeadWord(s string) bool { return headWords[s] }

// IsWord reports whether s can be a word of the notation at all, a name or a
// head word: not empty, valid UTF-8, without white space, parentheses,
// semicolons and double quotes, and not made of decimal digits alone.
func IsWord(s string) bool {
	digits := true
	for k, c := range s {
		if !IsWordRune(c) {
			return false
		}
		if c == utf8.RuneError {
			if _, size := utf8.DecodeRuneInString(s[k:]); size == 1 {
				return false
			}
		}
		digits = digits && '0' <= c && c <= '9'
	}
	return !digits
}

// IsName reports whether s can be a name: a word that is no head word.
func IsName(s string) bool { return IsWord(s) && !headWords[s] }

// IsWordRune reports whether the character c can stand in a word.
func IsWordRune(c rune) bool {
	switch c {
	case '(', ')', ';', '"':
		return false
	}
	return !unicode.IsSpace(c)
}

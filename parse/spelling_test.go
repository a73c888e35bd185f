package parse

import "testing"

func TestCanonicalNames(t *testing.T) {
	for typed, want := range map[string]string{
		"ζ": "zeta", "zeta": "zeta", "ε": "eps", "ϵ": "eps", "epsilon": "eps", "eps": "eps",
		"epsilon_1": "eps_1", "ε1": "eps1", "epsilon1": "eps1", "epsilons": "epsilons",
		"□": "box", "ℋ": "H", "Λ": "Lambda", "π": "pi", "µ": "mu", "μ": "mu", "δφ": "deltaphi", "ϕ": "phi",
		"a_b2": "a_b2", "é": "é",
	} {
		if got := Canonical(typed); got != want {
			t.Errorf("%s is read as %s, expected %s", typed, got, want)
		}
	}
}

// TestGreekLettersAreDistinct: no two letters but variants of one share a name.
func TestGreekLettersAreDistinct(t *testing.T) {
	variants := map[rune]rune{'ϵ': 'ε', 'ϑ': 'θ', 'ϰ': 'κ', 'µ': 'μ', 'ϖ': 'π', 'ϱ': 'ρ', 'ς': 'σ', 'ϕ': 'φ'}
	seen := map[string]rune{}
	for r := rune(0x370); r < 0x400; r++ {
		name, ok := greek[r]
		if _, isVariant := variants[r]; !ok || isVariant {
			continue
		}
		if old, ok := seen[name]; ok {
			t.Errorf("%c and %c are both %s", old, r, name)
		}
		seen[name] = r
	}
	if len(seen) != 48 {
		t.Errorf("%d letters have names, expected 24 small and 24 capital", len(seen))
	}
	for v, r := range variants {
		if greek[v] != greek[r] {
			t.Errorf("%c is read as %s, not as %s", v, greek[v], greek[r])
		}
	}
}

func TestEditDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{
		{"", "", 0}, {"a", "", 1}, {"zeta", "zeta", 0}, {"zta", "zeta", 1}, {"zeat", "zeta", 1},
		{"kitten", "sitting", 3}, {"ca", "abc", 3}, {"alpha", "aplha", 1},
	} {
		if got := editDistance(c.a, c.b, 10); got != c.want {
			t.Errorf("from %q to %q: %d, expected %d", c.a, c.b, got, c.want)
		}
		if got := editDistance(c.b, c.a, 10); got != c.want {
			t.Errorf("from %q to %q: %d, expected %d", c.b, c.a, got, c.want)
		}
	}
}

func TestNearest(t *testing.T) {
	names := []string{"alpha", "zeta", "theta", "M"}
	for _, c := range []struct {
		name, want string
		ok         bool
	}{
		{"zta", "zeta", true}, {"thta", "theta", true}, {"alhpa", "alpha", true},
		{"N", "", false}, {"gamma", "", false}, {"zeta", "", false},
	} {
		if got, ok := nearest(c.name, names); got != c.want || ok != c.ok {
			t.Errorf("nearest to %q is %q (%v), expected %q (%v)", c.name, got, ok, c.want, c.ok)
		}
	}
}

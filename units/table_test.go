package units

import (
	"math"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// No symbol can be read in two ways: with a prefix or without one, or with two
// different prefixes.
func TestSymbolsDoNotCollide(t *testing.T) {
	type reading struct {
		prefix, symbol string
		is             monomial
	}
	seen := map[string]reading{}
	symbols := table()
	for s, sym := range symbols {
		spellings := []string{""}
		for p := range prefixes {
			spellings = append(spellings, p)
		}
		for _, p := range append(spellings, "u", "μ") {
			got, ok := symbols.lookup(p + s)
			canonical := p
			if p == "u" || p == "μ" {
				canonical = "µ"
			}
			allowed := p == "" || sym.prefixes == siPrefixes || canonical != "da" && strings.Contains(sym.prefixes, canonical)
			if !allowed {
				continue
			}
			require.True(t, ok, p+s)
			want := sym.is
			want[ten] += int32(prefixes[canonical]) * exponentGrain
			before, twice := seen[p+s]
			if twice && before.is != want {
				t.Errorf("%s is %s-%s and %s-%s", p+s, before.prefix, before.symbol, p, s)
			}
			seen[p+s] = reading{p, s, want}
			assert.Equal(t, want, got.is, p+s)
		}
	}
	assert.Greater(t, len(seen), 300)
}

// The table spells each symbol once, and each zero belongs to a symbol.
func TestTableIsClean(t *testing.T) {
	var all []string
	for _, d := range definitions {
		all = append(all, strings.Fields(d.symbols)...)
	}
	symbols := table()
	assert.Len(t, symbols, len(all)+len(baseUnits), "a symbol stands twice")
	for s := range zeros {
		assert.True(t, slices.Contains(all, s), s)
		assert.Equal(t, Dimension{Temperature: 1}, func() Dimension { m := symbols[s].is; return m.dimension() }())
	}
	for _, p := range prefixes {
		assert.NotZero(t, p)
	}
	assert.Len(t, prefixes, 24) // SI, since 2022
}

// The package comment lists all symbols of the table, each with the prefixes it
// takes.
func TestPackageCommentListsTheTable(t *testing.T) {
	source, err := os.ReadFile("doc.go")
	require.NoError(t, err)
	_, rest, _ := strings.Cut(string(source), "//	all SI prefixes")
	all, rest, _ := strings.Cut(rest, "//	some prefixes")
	some, rest, _ := strings.Cut(rest, "//	no prefix")
	none, _, _ := strings.Cut(rest, "//\n")

	listed := map[string]string{}
	for prefixes, list := range map[string]string{siPrefixes: all, "some": some, "": none} {
		for s := range strings.FieldsSeq(strings.ReplaceAll(list, "//", "")) {
			listed[s] = prefixes
		}
	}
	have := map[string]string{}
	for s, sym := range table() {
		if have[s] = sym.prefixes; sym.prefixes != siPrefixes && sym.prefixes != "" {
			have[s] = "some"
		}
		u, err := ParseUnit(s)
		require.NoError(t, err)
		assert.True(t, u.Scale > 0 && !math.IsInf(u.Scale, 0), s)
	}
	assert.Equal(t, have, listed)
}

// Each dimension with a name has the dimension of its unit, which is one SI unit.
func TestNamesMatchTheirUnits(t *testing.T) {
	nouns := map[string]bool{}
	for d, n := range names {
		u, err := ParseUnit(n.unit)
		require.NoError(t, err)
		assert.Equal(t, Unit{Scale: 1, Dimension: d}, u, n.noun)
		assert.False(t, nouns[n.noun], n.noun)
		nouns[n.noun] = true
	}
	assert.Equal(t, "a pure number", Dimension{}.describe())
	assert.Equal(t, "length (m)", Dimension{Length: 1}.describe())
	assert.Equal(t, "m⁵", Dimension{Length: 5}.describe())
}

// Numbers of the table are powers of ten times one of the factors.
func TestNumerals(t *testing.T) {
	for i, f := range factors {
		assert.NotZero(t, f%10, "%d: tens are kept apart", f)
		m, ok := numeral(decimal{digits: strconv.FormatUint(f, 10) + "00", exp: -5})
		assert.True(t, ok)
		var want monomial
		want[ten], want[ten+1+i] = -3*exponentGrain, exponentGrain
		assert.Equal(t, want, m)
	}
	_, ok := numeral(decimal{digits: "7"})
	assert.False(t, ok)
}

// The limits of the exponents are reached and not passed.
func TestLimitsOfExponents(t *testing.T) {
	metre := table()["m"].is
	m := metre
	assert.True(t, m.pow(100*exponentGrain))
	assert.False(t, m.mul(&metre, 1))
	m = metre
	assert.True(t, m.pow(-100*exponentGrain))
	assert.False(t, m.mul(&metre, -1))
	m = table()["ppb"].is
	assert.True(t, m.pow(100*exponentGrain))
	assert.True(t, m.pow(5*exponentGrain))
	assert.False(t, m.pow(2*exponentGrain))
	m = table()["ppb"].is
	assert.True(t, m.pow(1))
	assert.False(t, m.pow(exponentGrain/2+1), "no multiple of 1/300")
}

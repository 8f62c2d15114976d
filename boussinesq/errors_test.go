package boussinesq

import (
	"errors"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// wantField asserts that err is a FieldError of that field.
func wantField(t testing.TB, err error, field string) {
	t.Helper()
	var bad *FieldError
	if !errors.As(err, &bad) {
		t.Errorf("error is %v, want one that names %s", err, field)
		return
	}
	assert.Equal(t, field, bad.Field)
	assert.NotEmpty(t, bad.Value)
	assert.NotEmpty(t, bad.Want)
}

func contains(list, word string) bool {
	for _, w := range strings.Fields(list) {
		if w == word {
			return true
		}
	}
	return false
}

func TestFieldErrorSaysAllOfIt(t *testing.T) {
	m := water(t)
	m.Viscosity = -2
	err := m.Check()
	require.Error(t, err)
	assert.Equal(t, "boussinesq: Material.Viscosity is "+m.Viscosity.String()+", want > 0 and finite", err.Error())

	err = &FieldError{Field: "Layer.Bottom", Value: "1 K", Want: "above 2 K", Err: ErrStable}
	assert.EqualError(t, err, "boussinesq: Layer.Bottom is 1 K, want above 2 K: heated from above")
	assert.ErrorIs(t, err, ErrStable)
}

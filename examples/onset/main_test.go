package main

import (
	"image/png"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestRunWritesVerdictTableAndPicture(t *testing.T) {
	out, text := t.TempDir(), strings.Builder{}
	require.NoError(t, run(&text, out))
	assert.Contains(t, text.String(), "The layer convects.")
	assert.Contains(t, text.String(), "with a probability of 0.")
	table, err := os.ReadFile(filepath.Join(out, "neutral.csv"))
	require.NoError(t, err)
	assert.Len(t, strings.Split(strings.TrimSpace(string(table)), "\n"), 102)
	file, err := os.Open(filepath.Join(out, "neutral.png"))
	require.NoError(t, err)
	defer file.Close()
	picture, err := png.Decode(file)
	require.NoError(t, err)
	assert.Equal(t, width, picture.Bounds().Dx())
	assert.Equal(t, height, picture.Bounds().Dy())
}

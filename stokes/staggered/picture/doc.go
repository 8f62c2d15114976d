// Package picture draws a field of the staggered grid as an image: a quick,
// honest look at a run without a plotting library.
//
//	img, err := picture.Draw(temperature, &picture.Settings{Stream: psi})
//	...
//	err = png.Encode(file, img)
//
// The box keeps its proportions, z points up, and colour runs through a scale
// of evenly growing lightness, so that equal steps of the field look equal and
// survive a copy in grey. The colours are our own, laid out in the OKLab space
// (Ottosson 2020, from memory).
package picture

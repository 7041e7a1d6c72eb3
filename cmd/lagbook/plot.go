package main

import (
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/draw"
	"lagbook/network/quantity"
	"lagbook/network/study"
	"lagbook/testdata/demo"

	"github.com/spf13/cobra"
)

// pictures are what --what takes.
var pictures = []string{"response", "frequency", "plane", "surface"}

// plot draws one picture.
func (a *app) plot() *cobra.Command {
	var what string
	var number int
	c := &cobra.Command{
		Use:   "plot [CASE.toml]",
		Short: "a picture: response, gain and phase, s-plane",
		Long: "plot draws one picture, as SVG or, where -o ends in .png, as PNG:\n\n" +
			"  response   what a [[table]] shows against time, with limits and changes of loads\n" +
			"  frequency  gain and phase of the transfer functions of one unit\n" +
			"  plane      poles and zeros of one transfer function\n" +
			"  surface    |H(s)| of one transfer function over the s-plane\n\n" +
			"--number picks the table or the transfer function, in the order of the verbs table\n" +
			"and poles. Units are those of [print]. With --format json, the data instead.",
		Example: "  lagbook plot --what response > response.svg\n" +
			"  lagbook plot --what surface --number 1 > surface.svg",
		Args: oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			format, err := a.pictureFormat(what)
			if err != nil {
				return err
			}
			m, err := a.modelOr(demo.Swing, args)
			if err != nil {
				return err
			}
			data, paint, err := picture(m, what, number)
			if err != nil {
				return a.failed(m, err)
			}
			if a.format == "json" {
				return a.answer(data, nil)
			}
			b, err := paint(format)
			if err != nil {
				return &fault{exitCase, err.Error()}
			}
			return a.publish(b)
		},
	}
	c.Flags().StringVar(&what, "what", "response", "`PICTURE` to draw: "+strings.Join(pictures, ", "))
	c.Flags().IntVar(&number, "number", 1, "`N` of the table or transfer function to draw")
	_ = c.RegisterFlagCompletionFunc("what", cobra.FixedCompletions(pictures, cobra.ShellCompDirectiveNoFileComp))
	return c
}

// pictureFormat settles what to draw and how before the case is read.
func (a *app) pictureFormat(what string) (draw.Format, error) {
	if !slices.Contains(pictures, what) {
		text := fmt.Sprintf("--what %q is no picture: use one of %s", what, strings.Join(pictures, ", "))
		if near, ok := quantity.Nearest(what, pictures); ok {
			text = fmt.Sprintf("--what %q is no picture; did you mean %q?", what, near)
		}
		return 0, &fault{exitUsage, text}
	}
	switch strings.ToLower(filepath.Ext(a.file)) {
	case ".svg":
		return draw.SVG, nil
	case ".png":
		return draw.PNG, nil
	}
	if a.file != "" && a.file != "-" && a.format != "json" {
		return 0, &fault{exitUsage, fmt.Sprintf("%s: a picture ends in .svg or .png", a.file)}
	}
	if a.format != "text" && a.format != "json" {
		return 0, &fault{exitUsage, fmt.Sprintf("a picture has no format %s: -o FILE.svg or -o FILE.png, or --format json for its data", a.format)}
	}
	return draw.SVG, nil
}

// picture asks the study for the data of a picture and says how to paint it.
func picture(m *study.Model, what string, number int) (data any, paint func(draw.Format) ([]byte, error), err error) {
	switch what {
	case "response":
		c, err := m.Curves(number)
		return c, func(f draw.Format) ([]byte, error) { return draw.Response(f, c, m.Show) }, err
	case "frequency":
		c, err := m.FrequencyCurves(number)
		return c, func(f draw.Format) ([]byte, error) { return draw.Gain(f, c, m.Show) }, err
	}
	c, err := m.Plane(number)
	if what == "surface" {
		return c, func(f draw.Format) ([]byte, error) { return draw.Surface(f, c, m.Show) }, err
	}
	return c, func(f draw.Format) ([]byte, error) { return draw.Plane(f, c, m.Show) }, err
}

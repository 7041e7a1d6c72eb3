package main

import (
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/draw"
	"lagbook/network/casefile"
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
	var s scenes
	var c *cobra.Command
	c = s.flags(&cobra.Command{
		Use:   "plot [CASE.toml]",
		Short: "a picture: response, gain and phase, s-plane",
		Long: "plot draws one picture, as SVG or, where -o ends in .png, as PNG:\n\n" +
			"  response   what a [[table]] shows against time, with limits and changes of loads\n" +
			"  frequency  gain and phase of the transfer functions of one unit\n" +
			"  plane      poles and zeros of one transfer function\n" +
			"  surface    |H(s)| of one transfer function over the s-plane\n\n" +
			"--number picks the table or the transfer function, in the order of the verbs table\n" +
			"and poles. Units are those of [print]. A response is drawn\n" +
			"under every scenario of the case in one picture; --scenario picks some. With --format json, the data instead.",
		Example: "  lagbook plot --what response > response.svg\n" +
			"  lagbook plot --what surface --number 1 > surface.svg",
		Args: oneCase,
		RunE: func(_ *cobra.Command, args []string) error {
			format, err := a.pictureFormat(what)
			if err != nil {
				return err
			}
			m, err := a.modelOr(s.example(demo.Swing), args)
			if err != nil {
				return err
			}
			list, err := s.of(m)
			if err != nil {
				return err
			}
			pick := number
			if !c.Flags().Changed("number") && (what == "plane" || what == "surface") {
				pick = 0 // the first with a pole
			}
			data, paint, err := a.picture(m, list, what, pick)
			if err != nil {
				return a.failed(m, err)
			}
			if err := a.show(data, paint, format); err != nil {
				return err
			}
			if c, ok := data.(*study.Curves); ok {
				return stopped(c.Evidence)
			}
			return nil
		},
	})
	c.Flags().StringVar(&what, "what", "response", "`PICTURE` to draw: "+strings.Join(pictures, ", "))
	c.Flags().IntVar(&number, "number", 1, "`N` of the table or transfer function to draw")
	_ = c.RegisterFlagCompletionFunc("what", cobra.FixedCompletions(pictures, cobra.ShellCompDirectiveNoFileComp))
	return c
}

// show prints a picture, or its data as JSON.
func (a *app) show(data any, paint func(draw.Format) ([]byte, error), format draw.Format) error {
	if a.format == "json" {
		return a.answer(data, nil)
	}
	b, err := paint(format)
	if err != nil {
		return &fault{exitCase, err.Error()}
	}
	return a.publish(b)
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
func (a *app) picture(m *study.Model, list []*casefile.Scenario, what string, number int) (data any, paint func(draw.Format) ([]byte, error), err error) {
	if what == "response" {
		c, err := m.CurvesUnder(list, number)
		return c, func(f draw.Format) ([]byte, error) { return draw.Response(f, c, m.Show) }, err
	}
	if list[0] != nil {
		if ds := m.Use(list[0]); casefile.Failed(ds) {
			return nil, nil, &study.Refusal{Diagnostics: ds}
		}
		if len(list) > 1 {
			a.note("the picture is that under scenario %q: --scenario picks another", list[0].Name)
		}
	}
	if what == "frequency" {
		c, err := m.FrequencyCurves(number)
		return c, func(f draw.Format) ([]byte, error) { return draw.Gain(f, c, m.Show) }, err
	}
	c, err := m.Plane(number)
	if what == "surface" {
		return c, func(f draw.Format) ([]byte, error) { return draw.Surface(f, c, m.Show) }, err
	}
	return c, func(f draw.Format) ([]byte, error) { return draw.Plane(f, c, m.Show) }, err
}

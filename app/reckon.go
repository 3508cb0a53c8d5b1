package main

import (
	"fmt"
	"io"
	"os"

	"halfvalue/exposure"
	"halfvalue/exposure/plan"
)

// reckonCmd is "reckon PLAN [--json] [--working]".
type reckonCmd struct {
	Plan    string `arg:"" help:"Plan file, or - for standard input."`
	JSON    bool   `name:"json" help:"Answer in JSON, figures unrounded."`
	Working bool   `help:"Add the steps behind every number."`
}

// Run computes and prints the reckoning.
func (c *reckonCmd) Run(e *env) error {
	p, err := readPlan(c.Plan, e.in)
	if err != nil {
		return err
	}
	r, err := exposure.Reckon(p, exposure.Calibration{})
	if err != nil {
		return err
	}
	if c.JSON {
		if !c.Working {
			r.Workings = nil
		}
		return printJSON(e.out, r)
	}
	if err := exposure.Report(e.out, p, r); err != nil {
		return err
	}
	if c.Working {
		return exposure.ReportWorking(e.out, r)
	}
	return nil
}

// maxPlanBytes bounds what is read as a plan; a real one has about 1 KB.
const maxPlanBytes = 1 << 20

// readPlan decodes a plan file, or standard input for "-".
func readPlan(name string, in io.Reader) (plan.Plan, error) {
	if name != "-" {
		f, err := os.Open(name)
		if err != nil {
			return plan.Plan{}, err
		}
		defer f.Close()
		in = f
	}
	data, err := io.ReadAll(io.LimitReader(in, maxPlanBytes+1))
	if err != nil {
		return plan.Plan{}, fmt.Errorf("%s: %w", name, err)
	}
	if len(data) > maxPlanBytes {
		return plan.Plan{}, fmt.Errorf("%s: more than %d bytes, this is no plan", name, maxPlanBytes)
	}
	return plan.Decode(data)
}

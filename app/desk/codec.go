package desk

import (
	"encoding/json"

	"halfvalue/exposure/plan"
)

func decode(data []byte) (plan.Plan, error) {
	var p plan.Plan
	err := json.Unmarshal(data, &p)
	return p, err
}

func encode(p plan.Plan) ([]byte, error) { return json.MarshalIndent(p, "", "  ") }

func fill(p plan.Plan) plan.Plan { return p }

package plan

import (
	"embed"
	"fmt"
)

//go:embed demo/*.json
var demoFiles embed.FS

// Demo is the plan that the app opens on when there is none: weld 3 of the
// invented job at Kestrel Ford pumping station.
func Demo() Plan { return demo("kf-12-weld-3") }

// Demos gives every plan of the invented job: the weld that Demo gives, three
// pipe welds, an impeller and a flange.
func Demos() []Plan {
	var list []Plan
	for _, name := range []string{"kf-12-weld-3", "kf-04-weld-1", "kf-07-weld-2", "kf-09-weld-5", "impeller-2", "flange-1"} {
		list = append(list, demo(name))
	}
	return list
}

func demo(name string) Plan {
	data, err := demoFiles.ReadFile("demo/" + name + ".json")
	if err != nil {
		panic("plan: " + err.Error())
	}
	p, err := Decode(data)
	if err != nil {
		panic(fmt.Sprintf("plan: demo/%s.json: %v", name, err))
	}
	return p
}

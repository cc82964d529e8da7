package assets

import (
	_ "embed"
	"encoding/json"
	"sync"
)

// Caution is one of the usual cautions that go with every printed set.
type Caution struct{ Topic, Text string }

//go:embed cautions.json
var cautionsJSON []byte

var cautions = sync.OnceValue(func() []Caution {
	var list []Caution
	if err := json.Unmarshal(cautionsJSON, &list); err != nil {
		panic("assets: cautions: " + err.Error())
	}
	return list
})

// Cautions returns the cautions in their order (common practice).
func Cautions() []Caution { return append([]Caution(nil), cautions()...) }

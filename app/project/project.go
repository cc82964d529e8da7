// Package project is the document: what a .stillroom file holds, its rules,
// its defaults and the history of its edits. It computes nothing.
//
// A Project is a value. Nobody changes the slices of a Project they were
// handed: an edit copies what it changes, so that former values stay whole and
// undo is the former value.
package project

import "stillroom/acoustics"

// Version is the version number of the file format this program writes.
const Version = 1

// Project is one document. Units are those of the field names; what carries
// no unit in its name is in metres.
type Project struct {
	Title, PreparedFor, PreparedBy, Note string

	Air          Air
	Room         Room
	Finishes     []Finish // the file's own, before the built-in list
	Loudspeakers []Loudspeaker
	Seats        []Seat
	Absorbers    []Absorber
	Limits       Limits
	KeepOut      []KeepOut // where no proposal may stand
	Stock        Stock     // of the user's own
}

// Air is the state of the air.
type Air struct {
	TemperatureC, RelativeHumidityPct, PressureKPa float64
}

// Room is the shell: inside dimensions and what each surface carries.
type Room struct {
	Length, Width, Height float64
	Surfaces              [6][]FinishShare // by acoustics.Surface; empty: the default finish
}

// FinishShare is a finish on a share of a surface.
type FinishShare struct {
	Finish string // id
	Share  float64
}

// Finish is a finish of the user's own. Absorption is by band name as in the
// file ("63", "31.5").
type Finish struct {
	ID, Name, Source string
	Absorption       map[string]float64
}

// Loudspeaker is a source in the room.
type Loudspeaker struct {
	ID       string
	At       acoustics.Point
	GainDB   float64
	DelayMS  float64
	Inverted bool
}

// Seat is a place to listen at.
type Seat struct {
	ID string
	At acoustics.Point
}

// Absorber is a designed absorber in its place. Exactly one of the kinds'
// blocks is set, the one Kind names.
type Absorber struct {
	ID      string
	Kind    string // one of Kinds
	Surface acoustics.Surface
	Centre  [2]float64 // of the first unit
	Size    [2]float64 // of one unit
	Units   int

	Neck            *Neck
	Panel           *Panel
	Perforated      *Perforated
	Slotted         *Slotted
	Microperforated *Microperforated
	Porous          *Porous
}

// Kinds lists the kinds of absorber by their names in the file.
func Kinds() []string {
	return []string{"neck", "panel", "perforated", "slotted", "microperforated", "porous"}
}

// Neck is a box with round necks.
type Neck struct {
	CavityL         float64
	MouthDiameterMM float64
	LengthMM        float64
	Mouths          int
	GauzePaSM       float64
	Fill            *NeckFill
}

// NeckFill fills a share of a neck box's cavity.
type NeckFill struct {
	Share, FlowPaSM2 float64
}

// Panel is a membrane over a cavity.
type Panel struct {
	MassKgM2, ThicknessMM, YoungsGPa, Poisson, LossFactor float64
	CavityMM, EdgePaSM                                    float64
	Fill                                                  *Fill
}

// Perforated is a panel with round holes.
type Perforated struct {
	PanelMM, HoleMM, PitchMM, CavityMM float64
	Partitioned                        bool
	Fill                               *Fill
	GauzePaSM                          float64
}

// Slotted is a front of slats.
type Slotted struct {
	SlatMM, SlotMM, PanelMM, CavityMM float64
	Partitioned                       bool
	Fill                              *Fill
}

// Microperforated is Maa's panel.
type Microperforated struct {
	PanelMM, HoleMM, PitchMM, CavityMM float64
	Partitioned                        bool
}

// Porous is a porous layer with an optional gap behind it.
type Porous struct {
	ThicknessMM, FlowPaSM2, GapMM float64
	Fluid                         *Fluid
}

// Fill is a porous layer in a cavity, at the wall or at the face.
type Fill struct {
	ThicknessMM, FlowPaSM2 float64
	AtFace                 bool
	Fluid                  *Fluid
}

// Fluid holds the four further parameters of Johnson, Champoux and Allard.
type Fluid struct {
	Porosity, Tortuosity, ViscousUM, ThermalUM float64
}

// Limits says how long a mode may ring. Curve, where not empty, is the name of
// a published curve ("music-2015", "artificial-2015"); else Points are the user's own.
type Limits struct {
	Curve  string
	Points []LimitPoint
}

// LimitPoint is one corner of a limit curve.
type LimitPoint struct{ Hz, Seconds float64 }

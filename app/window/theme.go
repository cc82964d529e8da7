package window

import (
	"image/color"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansitalic"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/theme"

	"stillroom/app/figures"
)

// look is the window's theme: paper by day, night in the dark, the same inks as
// the figures.
type look struct{ dark bool }

var _ fyne.Theme = look{}

// style returns the figures' inks.
func (l look) style() figures.Style {
	if l.dark {
		return figures.Night()
	}
	return figures.Paper()
}

func (l look) Color(name fyne.ThemeColorName, _ fyne.ThemeVariant) color.Color {
	s := l.style()
	shade := func(share float64) color.Color { return blend(s.Paper, s.Ink, share) }
	switch name {
	case theme.ColorNameBackground, theme.ColorNameOverlayBackground, theme.ColorNameMenuBackground:
		return s.Paper
	case theme.ColorNameForeground:
		return s.Ink
	case theme.ColorNameButton, theme.ColorNameHeaderBackground:
		return shade(0.07)
	case theme.ColorNameInputBackground:
		return shade(0.04)
	case theme.ColorNameInputBorder, theme.ColorNameSeparator:
		return shade(0.2)
	case theme.ColorNameHover:
		return translucent(s.Ink, 20)
	case theme.ColorNamePressed:
		return translucent(s.Ink, 45)
	case theme.ColorNameFocus, theme.ColorNameSelection:
		return translucent(s.Slate, 90)
	case theme.ColorNamePrimary, theme.ColorNameHyperlink:
		return s.Slate
	case theme.ColorNameForegroundOnPrimary:
		return s.Paper
	case theme.ColorNamePlaceHolder, theme.ColorNameDisabled:
		return shade(0.55)
	case theme.ColorNameScrollBar:
		return translucent(s.Ink, 80)
	case theme.ColorNameShadow:
		return translucent(s.Ink, 40)
	case theme.ColorNameError, theme.ColorNameWarning:
		return s.Warning
	}
	variant := theme.VariantLight
	if l.dark {
		variant = theme.VariantDark
	}
	return theme.DefaultTheme().Color(name, variant)
}

func blend(a, b color.Color, share float64) color.Color {
	ar, ag, ab, _ := a.RGBA()
	br, bg, bb, _ := b.RGBA()
	m := func(x, y uint32) uint8 { return uint8((float64(x)*(1-share) + float64(y)*share) / 257) }
	return color.NRGBA{m(ar, br), m(ag, bg), m(ab, bb), 255}
}

func translucent(c color.Color, alpha uint8) color.Color {
	n := color.NRGBAModel.Convert(c).(color.NRGBA)
	n.A = alpha
	return n
}

func (look) Font(style fyne.TextStyle) fyne.Resource {
	switch {
	case style.Bold:
		return fyne.NewStaticResource("bold.ttf", liberationsansbold.TTF)
	case style.Italic:
		return fyne.NewStaticResource("italic.ttf", liberationsansitalic.TTF)
	case style.Symbol:
		return theme.DefaultTheme().Font(style)
	}
	return fyne.NewStaticResource("regular.ttf", liberationsansregular.TTF)
}

func (look) Icon(name fyne.ThemeIconName) fyne.Resource { return theme.DefaultTheme().Icon(name) }

func (look) Size(name fyne.ThemeSizeName) float32 {
	switch name {
	case theme.SizeNameText:
		return 12
	case theme.SizeNameCaptionText:
		return 10.5
	case theme.SizeNameInnerPadding:
		return 5
	case theme.SizeNamePadding:
		return 3
	case theme.SizeNameInlineIcon:
		return 15
	case theme.SizeNameScrollBar:
		return 10
	case theme.SizeNameInputRadius, theme.SizeNameSelectionRadius:
		return 2
	}
	return theme.DefaultTheme().Size(name)
}

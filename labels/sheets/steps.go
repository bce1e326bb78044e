package sheets

import (
	"drawup/dilution"
	"drawup/labels"
)

// steps are the acts of making one syringe, one a line, in order. That the
// label comes after the filling, is matched with the ampoule, and that the
// ampoule is kept until the check are rules of the bodies named in the
// documentation; turning to mix and looking are common practice, without a
// source.
func (s scribe) steps() []labels.Line {
	var out []labels.Line
	act := func(pattern string) { out = append(out, s.say(pattern)) }
	if s.p.Presentation.Powder() {
		s.dissolve(act)
	}
	if s.p.Drug.Has("shake or invert") || s.p.Presentation.Form == "emulsion" {
		act("Turn the " + s.p.Presentation.Container + " over several times: the contents must look even.")
	}
	if s.p.Drug.Has("filter needle") {
		act("Put a filter needle on the syringe that draws.")
	}
	s.draw(act)
	if s.p.Mixture.Method != dilution.Neat {
		act("Mix: turn the " + s.vessel() + " end over end several times.")
	}
	act(s.look())
	if s.p.Drug.Has("protect from light") {
		act("Keep it from light.")
	}
	act("Label it now; read label and " + s.p.Presentation.Container + " against each other, aloud.")
	act("Keep the empty " + s.p.Presentation.Container + " beside it until it is checked.")
	return out
}

func (s scribe) vessel() string {
	if s.bag() {
		return "bag"
	}
	return "syringe"
}

// dissolve is the making of a solution from powder.
func (s scribe) dissolve(act func(string)) {
	each := "the " + s.p.Presentation.Container
	if s.p.Mixture.Containers > 1 {
		each = "each of {container.count} " + s.p.Presentation.Container + "s"
	}
	act("Add {powder.added} of {=" + s.p.Mixture.AddFluid + "} to " + each + " of " + s.drug() + ", {container.amount}.")
	act("Let all of the powder dissolve: each " + s.p.Presentation.Container + " now holds {container.volume}, {strength}.")
}

// draw is drawing, filling and reading, by the method (rule R5).
func (s scribe) draw(act func(string)) {
	m := s.p.Mixture
	from := s.from()
	with := ", {drug.barrel} syringe."
	switch m.Method {
	case dilution.Neat:
		if s.oneSyringe() {
			act("Draw up {drug.volume}" + from + with)
			break
		}
		act("Draw up {drug.volume}" + from + ", into a {final.barrel} syringe; measure with {drug.barrel}.")
	case dilution.MakeUpTo:
		act("Draw up {drug.volume}" + from + with)
		if !s.oneSyringe() {
			act("Put it into the {final.barrel} syringe.")
		}
		act("Add {=" + m.Diluent + "} up to {final.volume}; that is {diluent.volume}.")
	case dilution.AddTo:
		act("Take a bag of {diluent.volume} of {=" + m.Diluent + "}.")
		act("Draw up {drug.volume}" + from + with)
		act("Add it to the full bag; the bag then holds {final.volume}.")
	case dilution.WithdrawThenAdd:
		act("Take a bag of {final.volume} of {=" + m.Diluent + "}.")
		act("Withdraw {drug.volume} from the bag and discard it; {diluent.volume} stay.")
		act("Draw up {drug.volume}" + from + with)
		act("Add it to the bag; the bag again holds {final.volume}.")
	}
	if !s.bag() {
		act("Expel the air: the syringe reads {final.volume}.")
	}
}

// look is what must be seen before the label goes on.
func (s scribe) look() string {
	if s.p.Presentation.Form == "emulsion" {
		return "Look: even and white, nothing separated, no foreign body. If not, discard."
	}
	return "Look: clear, no particles, colour as the pack says. If not, discard."
}

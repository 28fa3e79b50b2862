package main

import "gylebook/gravity/method"

// The cautions, each shown once a command. They are short and neutral, and they
// defer to local rules.
var (
	cautionEstimate      = caution("estimate from gravity readings, not a laboratory determination; confirm with an accepted method before declaring")
	cautionContainers    = caution("if fermentable sugar remains, containers can burst; stable readings alone do not prove the end of fermentation")
	cautionHot           = caution("hot liquid: burns and broken glass; cool before reading; the correction is weaker here")
	cautionRefractometer = caution("alcohol distorts this reading; use a hydrometer for decisions")
)

func caution(text string) method.Note { return method.Note{Code: method.Caution, Text: text} }

// cautionRule says which rule set a declared figure follows.
func cautionRule(name, dated string) method.Note {
	if dated == "" {
		dated = "date not stated"
	} else {
		dated = "dated " + dated
	}
	return caution("rule set " + name + ", " + dated + "; check the current official text; the operator remains responsible")
}

var (
	cautionRestart = caution("fermentation may restart; a new watch period has begun")
	cautionBroken  = caution("discard liquid that may contain glass or shot")
	cautionRecords = caution("retention differs by country; follow local rules")
)

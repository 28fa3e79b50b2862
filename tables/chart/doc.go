// Package chart draws pictures from neutral data, as SVG and as PNG: the course of
// readings over time ([Course]) and individual values in order ([Control]). Plain
// numbers, names and units go in, bytes come out; what the numbers mean, and the
// text beside a picture, belong to the caller.
//
// The same data gives the same bytes. Text is drawn as the outlines of an embedded
// font, so a picture looks the same everywhere, refers to nothing outside itself
// and holds no text that could be read as markup. Colours are those of Okabe and
// Ito, which people with any colour vision tell apart; shape and line style say the
// same once more, for prints in grey.
//
// Of gonum.org/v1/plot only the geometry is used: its drawing packages read a dozen
// fonts and tables of mathematical signs when a program starts, which a command
// that draws nothing would pay for too.
package chart

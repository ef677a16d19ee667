# What all figures share. Before this stand: format (svg or pdf), output,
# input, and the figure's own variables (height in units of 600 for the width).
#
# Sizes are for 160 mm of width: 12.5 units of 600 in SVG and 10 pt in PDF both
# show as at least 9 pt there. Colours: Okabe and Ito's, told apart with any
# colour vision; a second sign (mark, dash) always goes with them.
set encoding utf8
set datafile separator comma
set datafile columnheaders
set key noautotitle noenhanced
if (!exists("height")) height = 380
if (format eq "svg") {
    set terminal svg noenhanced size 600,height font "sans-serif,13" linewidth 1 dynamic background rgb "white"
} else {
    set terminal pdfcairo noenhanced size 16cm,(16.0 * height / 600)cm font "sans,10" fontscale 0.75 linewidth 1
}
set output output

black = "#000000"
grey = "#666666"
blue = "#0072b2"
sky = "#56b4e9"
orange = "#e69f00"
vermillion = "#d55e00"
green = "#009e73"

set border 3 linewidth 1 linecolor rgb black
set tics out nomirror
set grid linetype 1 linewidth 0.5 linecolor rgb "#dddddd"
set key above horizontal center Left reverse maxrows 2 samplen 2 spacing 1.2
set rmargin 4
set bmargin 3.6

# What the error bar that is claimed from one notebook is worth.
# Reads: what, coverage, its error.
set xlabel "studies whose claimed 95 % interval holds the truth / %"
set xrange [low:100]
set yrange [-0.5:0.5]
unset ytics
set border 1
set grid noytics
set key maxrows 1
set arrow 1 from 95, graph 0 to 95, graph 1 nohead back linecolor rgb black linewidth 1.8 dashtype 2
set style fill solid 1 noborder
plot input using (strcol(1) eq "found" ? $2 : NaN):(0):(low):2:(-0.22):(0.22) with boxxyerror linecolor rgb sky title "what it holds", \
     input using (strcol(1) eq "found" ? $2 : NaN):(0):3 with xerrorbars pointtype 7 pointsize 0.6 linecolor rgb black linewidth 1.8 notitle, \
     NaN with lines linecolor rgb black linewidth 1.8 dashtype 2 title "claimed: 95 %"

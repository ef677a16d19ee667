# Where the plan resolves: the bath's fluctuation against fillings of each
# level, coloured by the figure; the bar as a contour, the plan as a mark.
# Reads: what, fluctuation, from, to, fillings, figure.
set xlabel "bath fluctuation / K"
set ylabel "fillings of each level"
set cblabel figure_label
set logscale x
set xrange [0.004:0.625]
set yrange [0.5:6.5]
set ytics 1
set xtics (0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5)
unset grid
set cbrange [*:100]
# dark blue to yellow, even steps of lightness for any colour vision
set palette defined (0 "#00224e", 0.25 "#434e6c", 0.5 "#7d7c78", 0.75 "#bcae6c", 1 "#fee838")
set style fill solid 1 noborder
set rmargin 12
is(what) = strcol(1) eq what ? column(2) : NaN
plot input using (is("cell")):5:3:4:($5 - 0.5):($5 + 0.5):6 with boxxyerror fillcolor palette notitle, \
     input using (is("bar")):5 with linespoints pointtype 7 pointsize 0.5 linecolor rgb "white" linewidth 5 notitle, \
     input using (is("bar")):5 with linespoints pointtype 7 pointsize 0.5 linecolor rgb vermillion linewidth 2 title sprintf("%g %% is reached to the left", bar), \
     "+" using (now):(fillings) every ::0::0 with points pointtype 13 pointsize 2 linecolor rgb black notitle, \
     "+" using (now):(fillings) every ::0::0 with points pointtype 13 pointsize 1.4 linecolor rgb sky title "the plan"

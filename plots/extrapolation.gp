# One synthetic study: every level and the analyst's line down to no polymer,
# intact on the left and cleaved on the right.
# Reads: series, what, concentration, ordinate.
names = curves > 1 ? " (circles: Huggins, triangles: Kraemer)" : ""
set multiplot layout 1, 2 title sprintf("One simulated study; its estimate: %s%s", note, names) noenhanced
set xlabel "concentration / (g/dL)"
set ylabel y_label
set xrange [0:*]
set offsets 0, graph 0.06, graph 0.12, graph 0.12
set xtics nomirror autofreq
set key off

at(series, what) = strcol(1) eq series && strcol(2) eq what ? column(3) : NaN

do for [series in "intact cleaved"] {
    set title (series eq "intact" ? intact_title : cleaved_title)
    plot input using (at(series, "line")):4 with lines linecolor rgb blue linewidth 1.8, \
         input using (at(series, "level")):4 with points pointtype 7 pointsize 0.8 linecolor rgb blue, \
         input using (at(series, "intercept")):4 with points pointtype 6 pointsize 1 linewidth 1.8 linecolor rgb black, \
         for [k=1:curves > 1] input using (at(series, "line 2")):4 with lines linecolor rgb vermillion linewidth 1.8 dashtype 2, \
         for [k=1:curves > 1] input using (at(series, "level 2")):4 with points pointtype 9 pointsize 0.9 linecolor rgb vermillion
}
unset multiplot

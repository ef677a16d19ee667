# One synthetic study: every level and the analyst's line down to no polymer,
# intact on the left and cleaved on the right.
# Reads: series, what, concentration, ordinate.
names = curves > 1 ? " (circles: Huggins, triangles: Kraemer)" : ""
set multiplot layout 1, 2 title sprintf("One simulated study; its estimate: %s%s", note, names) noenhanced
set xlabel "concentration / (g/dL)"
set ylabel y_label
set xrange [0:*]
set offsets 0, graph 0.06, graph 0.12, graph 0.12
set key off

# A step of 1, 2 or 5 times a power of ten that gives two to five steps.
power_of_ten(x) = 10 ** floor(log10(x))
round_up(x) = (x <= 1 ? 1 : x <= 2 ? 2 : x <= 5 ? 5 : 10)
tic_step(top) = round_up(top / 4.0 / power_of_ten(top / 4.0)) * power_of_ten(top / 4.0)

at(series, what) = strcol(1) eq series && strcol(2) eq what ? column(3) : NaN

do for [series in "intact cleaved"] {
    stats input using (at(series, "level")) name "conc" nooutput
    set xtics nomirror tic_step(conc_max)
    set title (series eq "intact" ? intact_title : cleaved_title)
    plot input using (at(series, "line")):4 with lines linecolor rgb blue linewidth 1.8, \
         input using (at(series, "level")):4 with points pointtype 7 pointsize 0.8 linecolor rgb blue, \
         input using (at(series, "intercept")):4 with points pointtype 6 pointsize 1 linewidth 1.8 linecolor rgb black, \
         for [k=1:curves > 1] input using (at(series, "line 2")):4 with lines linecolor rgb vermillion linewidth 1.8 dashtype 2, \
         for [k=1:curves > 1] input using (at(series, "level 2")):4 with points pointtype 9 pointsize 0.9 linecolor rgb vermillion
}
unset multiplot

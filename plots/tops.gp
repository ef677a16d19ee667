# How the estimate scatters, and how far it is off, over the relative viscosity
# of the most concentrated cleaved solution, for each extrapolation.
# Reads: extrapolation, top, standard deviation, bias.
set multiplot layout 2, 1
set lmargin 11
names = "Huggins Kraemer Martin common_intercept single_point"
name(k) = k == 4 ? "common intercept" : k == 5 ? "single point" : word(names, k)
array colour[5] = [blue, vermillion, black, green, orange]
array mark[5] = [7, 9, 4, 13, 6]
array dash[5] = [1, 2, 1, 4, 3]
of(k) = strcol(1) eq name(k) ? $2 : NaN
set arrow 1 from now, graph 0 to now, graph 1 nohead back linecolor rgb grey linewidth 1 dashtype 3
set format x ""
set bmargin 1
set ylabel "standard deviation / points"
set yrange [0:*]
set key above horizontal maxrows 2
plot for [k=1:5] input using (of(k)):3 with linespoints pointtype mark[k] pointsize 0.7 linecolor rgb colour[k] linewidth 1.5 dashtype dash[k] title name(k)
set format x "%g"
set bmargin 3.6
set key off
set yrange [*:*]
set xlabel "relative viscosity of the top cleaved solution"
set ylabel "bias / points"
plot 0 with lines linecolor rgb grey linewidth 1 notitle, \
     for [k=1:5] input using (of(k)):4 with linespoints pointtype mark[k] pointsize 0.7 linecolor rgb colour[k] linewidth 1.5 dashtype dash[k] notitle
unset multiplot

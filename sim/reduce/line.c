#include "sim/reduce/line.h"

#include <math.h>

/* Weighted sums about the mean of x: nothing cancels. */
struct line line_fit(size_t n, const double *x, const double *y, const double *weight)
{
    double sw = 0.0, swx = 0.0, swy = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double w = weight ? weight[i] : 1.0;
        sw += w;
        swx += w * x[i];
        swy += w * y[i];
    }
    const double mx = swx / sw, my = swy / sw;
    double sxx = 0.0, sxy = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double w = weight ? weight[i] : 1.0, dx = x[i] - mx;
        sxx += w * dx * dx;
        sxy += w * dx * (y[i] - my);
    }
    const double slope = sxy / sxx;
    return (struct line){my - slope * mx, slope};
}

struct line_errors line_errors(size_t n, const double *x, const double *y, struct line line)
{
    const double count = (double)n;
    double mx = 0.0, sxx = 0.0, squares = 0.0, sum_x2 = 0.0;
    for (size_t i = 0; i < n; i++) mx += x[i] / count;
    for (size_t i = 0; i < n; i++) {
        const double dx = x[i] - mx, residual = y[i] - line.intercept - line.slope * x[i];
        sxx += dx * dx;
        sum_x2 += x[i] * x[i];
        squares += residual * residual;
    }
    const double s = sqrt(squares / (count - 2.0));
    return (struct line_errors){s * sqrt(sum_x2 / (count * sxx)), s / sqrt(sxx), -mx * count / sqrt(count * sum_x2), s};
}

/* Each slope given the intercept b is (sum w x y - b sum w x)/sum w x^2; what
 * is left is one equation for b. */
void line_fit_common(size_t n, const double *x, const double *const y[2], const double *weight, struct line out[2])
{
    double sw = 0.0, swx = 0.0, swxx = 0.0, swy[2] = {0}, swxy[2] = {0};
    for (size_t i = 0; i < n; i++) {
        const double w = weight ? weight[i] : 1.0;
        sw += w;
        swx += w * x[i];
        swxx += w * x[i] * x[i];
        for (int k = 0; k < 2; k++) {
            swy[k] += w * y[k][i];
            swxy[k] += w * x[i] * y[k][i];
        }
    }
    const double pull = swx / swxx;
    const double b = (swy[0] + swy[1] - pull * (swxy[0] + swxy[1])) / (2.0 * (sw - pull * swx));
    for (int k = 0; k < 2; k++) out[k] = (struct line){b, (swxy[k] - b * swx) / swxx};
}

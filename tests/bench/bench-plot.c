/* bench-plot.c - what building the pyramid and the averages costs, and drawing a strip at every zoom. Prints CPU
 * milliseconds, the median of 15 draws. */
#include <cairo.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include "core/random.h"
#include "plot/ribbon.h"
#include "plot/strip.h"

#define REPEATS 15
#define WIDTH 1600
#define HEIGHT 400

static double
cpu_ms (void)
{
  struct timespec t;
  clock_gettime (CLOCK_THREAD_CPUTIME_ID, &t);
  return 1e3 * (double) t.tv_sec + 1e-6 * (double) t.tv_nsec;
}

static int
ascending (const void *a, const void *b)
{
  double x = *(const double *) a, y = *(const double *) b;
  return (x > y) - (x < y);
}

static float *
series_of (size_t n)
{
  float *value = malloc (n * sizeof *value);
  AntRandom random;
  ant_random_seed (&random, 1, 1);
  double slow = 0;
  for (size_t i = 0; i < n; i++)
    {
      slow = 0.999 * slow + 2 * ant_random_normal (&random);
      value[i] = i % 97 == 0 || (i / 5000) % 40 == 7 ? NAN : (float) (slow + 30 * ant_random_normal (&random));
    }
  return value;
}

static double
draw_ms (const AntStrip *strip, const AntView *view, const AntTheme *theme, double scale)
{
  double cost[REPEATS];
  AntBox box = { 0, 0, WIDTH / scale, HEIGHT / scale };
  cairo_surface_t *surface = cairo_image_surface_create (CAIRO_FORMAT_RGB24, WIDTH, HEIGHT);
  for (int k = 0; k < REPEATS; k++)
    {
      cairo_t *cr = cairo_create (surface);
      cairo_scale (cr, scale, scale);
      double t0 = cpu_ms ();
      ant_strip_paint (cr, &box, strip, view, theme, scale);
      cairo_surface_flush (surface);
      cost[k] = cpu_ms () - t0;
      cairo_destroy (cr);
    }
  cairo_surface_destroy (surface);
  qsort (cost, REPEATS, sizeof *cost, ascending);
  return cost[REPEATS / 2];
}

int
main (int argc, char **argv)
{
  static const size_t lengths[] = { 10000000, 30000000 };
  double worst = 0, step_d = 60 / 86400.0;
  AntTheme theme;
  AntTimeReference time = { .scale = ANT_SCALE_UTC, .origin_known = 1, .origin_jd1 = 2451544.5 };
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  for (size_t l = 0; l < (argc > 1 ? 1 : sizeof lengths / sizeof *lengths); l++)
    {
      size_t n = argc > 1 ? (size_t) atof (argv[1]) : lengths[l];
      float *value = series_of (n);
      float *curve = malloc (n * sizeof *curve);
      for (size_t i = 0; i < n; i++)
        curve[i] = (float) (60 * sin ((double) i / 6000));
      double t0 = cpu_ms ();
      AntPyramid *pyramid = ant_pyramid_new (n, value);
      double t1 = cpu_ms ();
      AntAverages *averages = ant_averages_new (n, value, 30);
      double t2 = cpu_ms ();
      printf ("n %zu: pyramid %.1f ms, %.1f %% of the data; averages of 30 samples %.1f ms\n", n, t1 - t0,
              100.0 * (double) ant_pyramid_bytes (pyramid) / (double) (n * sizeof *value), t2 - t1);
      AntDipMark dip = { (double) n / 2 * step_d, 0.3, 500, 1, ANT_LOOK_PLANET };
      for (double seen = (double) n; seen >= 50; seen /= 2)
        {
          AntStrip strip = { .title = "Residual, ppm", .time = &time, .pyramid = pyramid, .step_d = step_d, .line = NAN,
                             .n_dips = 1, .dip = &dip, .selected = 0, .brackets = 1, .time_axis = 1 };
          double middle = (double) n / 2 * step_d;
          AntView view = { middle - seen / 2 * step_d, middle + seen / 2 * step_d, -200, 200, 0, 0 };
          double bare = draw_ms (&strip, &view, &theme, 1);
          strip.averages = averages;
          strip.curve = curve;
          double full = draw_ms (&strip, &view, &theme, 1), doubled = draw_ms (&strip, &view, &theme, 2);
          worst = fmax (worst, fmax (full, doubled));
          printf ("  %10.0f samples, %8.2f a pixel: %.2f ms; with averages and curve %.2f, on a doubled display %.2f\n",
                  seen, seen / WIDTH, bare, full, doubled);
        }
      ant_pyramid_free (pyramid);
      ant_averages_free (averages);
      free (value);
      free (curve);
    }
  printf ("worst draw %.2f ms\n", worst);
  return 0;
}

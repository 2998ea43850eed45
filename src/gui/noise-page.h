/* noise-page.h - the page Noise: power spectrum, noise floor, and the parts of the fitted noise. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_NOISE_PAGE (ant_noise_page_get_type ())
G_DECLARE_FINAL_TYPE (AntNoisePage, ant_noise_page, ANT, NOISE_PAGE, GtkWidget)

void ant_noise_page_set_desk (AntNoisePage *self, AntDesk *desk);

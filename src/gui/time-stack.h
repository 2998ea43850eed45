/* time-stack.h - strips over one time axis, the ribbon under them, and the readout of what is under the pointer. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_TIME_STACK (ant_time_stack_get_type ())
G_DECLARE_FINAL_TYPE (AntTimeStack, ant_time_stack, ANT, TIME_STACK, GtkWidget)

void ant_time_stack_set_desk (AntTimeStack *self, AntDesk *desk);

#include "kent_model.h"

#include <math.h>

double kent_pipe_rating(const kent_pipe *p, kent_rating rating)
{
    switch (rating) {
    case KENT_RATING_SERVICE:
        break;
    case KENT_RATING_RECURRING:
        if (!isnan(p->recurring_rating)) return p->derating * p->recurring_rating;
        if (!isnan(p->surge_rating)) return p->derating * p->surge_rating;
        break;
    case KENT_RATING_SURGE:
        if (!isnan(p->surge_rating)) return p->derating * p->surge_rating;
        break;
    case KENT_RATING_TEST:
        return p->derating * p->test_rating;
    case KENT_RATINGS:
        break;
    }
    return p->derating * p->pressure_rating;
}

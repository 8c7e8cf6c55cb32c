/* Inside report/ only: what the parts of the printed results share. Each part prints
 * one section, or nothing where there is nothing to say. */
#ifndef KENT_PAGE_H
#define KENT_PAGE_H

#include "kent_listing.h"
#include "kent_table.h"

/* Who judges, and what prevails: the end of every sheet. */
#define KENT_PAGE_JUDGE                                                                \
    "Figures for competent, licensed engineers to judge. Local codes, the utility's "  \
    "standard and the manufacturer's instructions prevail over them. Confirm soil "    \
    "values on site before anything is built."

/* What the parts of one printed report share. */
typedef struct kent_page {
    const kent_results *results;
    const kent_model *model;
    kent_system units;
    bool wide;
    size_t limit; /* columns of a line; 0: none */
    kent_listing listing;
    char (*letter)[4]; /* [fitting_count] of its note; "" none */
    size_t *system;    /* [fitting_count] 1 .. of its restrained system; 0 none */
    bool cut;          /* a name was cut short */
    kent_text *out;
} kent_page;

/* A heading, the table under it, and the table is let go. Nothing where it is empty. */
void kent_page_finish(kent_page *page, const char *heading, kent_table *t);

/* A paragraph; words is let go. */
void kent_page_say(kent_page *page, const char *lead, kent_text *words);

void kent_page_cautions(kent_page *page);  /* the unsafe first, alike ones as one */
void kent_page_either(kent_page *page);    /* block and joints side by side */
void kent_page_systems(kent_page *page);   /* restrained pipe; who is near whom */
void kent_page_pulls(kent_page *page);     /* at ends of strings, down steep ground */
void kent_page_limits(kent_page *page);    /* what was reached against what is asked */
void kent_page_runs(kent_page *page);      /* what supports take, where such runs are */
void kent_page_devices(kent_page *page);   /* extremes of devices, by scenario */
void kent_page_cavities(kent_page *page);  /* the largest cavities, by scenario */
void kent_page_twins(kent_page *page);     /* scenarios that repeat another's events */
void kent_page_screening(kent_page *page); /* figures for a hand check */
void kent_page_swings(kent_page *page);    /* how often plastics are swung, how far */

#endif

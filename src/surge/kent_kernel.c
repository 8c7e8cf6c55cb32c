#include "kent_kernel_internal.h"

#include <string.h>

/* target bodies and a pointer rather than target_clones: the latter crashes under
 * gcc's ThreadSanitizer and binds wrongly with clang 14. */
/* NOLINTBEGIN(bugprone-macro-parentheses,readability-function-size): an attribute
 * stands bare; arrays that restrict must name */
#define KENT_KERNEL(level, attribute)                                                  \
    attribute static int64_t explicit_##level(                                         \
        size_t n, double limit, const double *restrict k, double *restrict p,          \
        double *restrict m, double *restrict highest, double *restrict lowest)         \
    {                                                                                  \
        return (int64_t)n -                                                            \
               kent_kernel_body(n, limit, 0, k, p, m, highest, lowest, NULL);          \
    }                                                                                  \
    attribute static int64_t explicit_watch_##level(                                   \
        size_t n, double limit, const double *restrict k, double *restrict p,          \
        double *restrict m, double *restrict highest, double *restrict lowest,         \
        const kent_floor *restrict floors, uint8_t *restrict low)                      \
    {                                                                                  \
        return kent_kernel_blocks(n, limit, 0, k, p, m, highest, lowest, floors, low); \
    }                                                                                  \
    attribute static int64_t implicit_##level(                                         \
        size_t n, double limit, const double *restrict k, double *restrict p,          \
        double *restrict m, double *restrict highest, double *restrict lowest)         \
    {                                                                                  \
        return (int64_t)n -                                                            \
               kent_kernel_body(n, limit, 1, k, p, m, highest, lowest, NULL);          \
    }                                                                                  \
    attribute static int64_t implicit_watch_##level(                                   \
        size_t n, double limit, const double *restrict k, double *restrict p,          \
        double *restrict m, double *restrict highest, double *restrict lowest,         \
        const kent_floor *restrict floors, uint8_t *restrict low)                      \
    {                                                                                  \
        return kent_kernel_blocks(n, limit, 1, k, p, m, highest, lowest, floors, low); \
    }                                                                                  \
    attribute static void recall_##level(const kent_fade *f, double *restrict p,       \
                                         double *restrict m)                           \
    {                                                                                  \
        kent_fade_recall(f, p, m);                                                     \
    }                                                                                  \
    attribute static void yield_##level(const kent_fade *f, double *restrict p,        \
                                        double *restrict m)                            \
    {                                                                                  \
        kent_fade_yield(f, p, m);                                                      \
    }

KENT_KERNEL(base, )
#ifdef __x86_64__
KENT_KERNEL(avx2, __attribute__((target("avx2"))))
KENT_KERNEL(avx512, __attribute__((target("avx512f"))))
#endif
/* NOLINTEND(bugprone-macro-parentheses,readability-function-size) */

/* Best last. */
static const kent_kernel KERNELS[] = {
    {"base", explicit_base, implicit_base, explicit_watch_base, implicit_watch_base,
     recall_base, yield_base},
#ifdef __x86_64__
    {"avx2", explicit_avx2, implicit_avx2, explicit_watch_avx2, implicit_watch_avx2,
     recall_avx2, yield_avx2},
    {"avx512", explicit_avx512, implicit_avx512, explicit_watch_avx512,
     implicit_watch_avx512, recall_avx512, yield_avx512},
#endif
};
enum { KERNEL_COUNT = sizeof KERNELS / sizeof KERNELS[0] };

static bool processor_has(size_t level)
{
#ifdef __x86_64__
    __builtin_cpu_init();
    if (level == 1) return __builtin_cpu_supports("avx2");
    if (level == 2) return __builtin_cpu_supports("avx512f");
#endif
    return level == 0;
}

kent_status kent_kernel_pick(const char *wanted, const kent_kernel **out,
                             kent_error *err)
{
    const bool any = !wanted || wanted[0] == '\0';
    for (size_t i = KERNEL_COUNT; i-- > 0;) {
        if (!any && strcmp(wanted, KERNELS[i].name) != 0) continue;
        if (processor_has(i)) {
            *out = &KERNELS[i];
            return KENT_OK;
        }
        if (!any) {
            /* unreached: where the processor has all of them */
            return kent_error_set(err, KENT_E_INPUT, "KENTLEDGE_SIMD",
                                  "this processor lacks %s; unset it or use base",
                                  wanted);
        }
    }
    return kent_error_set(err, KENT_E_INPUT, "KENTLEDGE_SIMD",
                          "'%s' is no kernel; base, avx2 or avx512", wanted);
}

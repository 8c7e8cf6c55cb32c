#include "kent_model.h"

/* Words of the case file and of results, one list for each enumeration. */
#define FITTING_TYPES(X)                                                               \
    X(KENT_BEND, "bend")                                                               \
    X(KENT_TEE, "tee")                                                                 \
    X(KENT_WYE, "wye")                                                                 \
    X(KENT_CROSS, "cross")                                                             \
    X(KENT_REDUCER, "reducer")                                                         \
    X(KENT_DEAD_END, "dead-end")                                                       \
    X(KENT_VALVE, "valve")                                                             \
    X(KENT_STRAIGHT, "straight")                                                       \
    X(KENT_CURVE, "curve")                                                             \
    X(KENT_GROUP, "group")

#define ROLES(X)                                                                       \
    X(KENT_ROLE_NONE, "")                                                              \
    X(KENT_ROLE_TAPPING, "tapping-tee")                                                \
    X(KENT_ROLE_HYDRANT, "hydrant")                                                    \
    X(KENT_ROLE_AIR_VALVE, "air-valve-tee")                                            \
    X(KENT_ROLE_WASHOUT, "washout-tee")                                                \
    X(KENT_ROLE_MANHOLE, "manhole-tee")                                                \
    X(KENT_ROLE_WALL, "wall-piece")                                                    \
    X(KENT_ROLE_FLANGE_ADAPTOR, "flange-adaptor")

#define BRANCH_ENDS(X)                                                                 \
    X(KENT_BRANCH_NONE, "none")                                                        \
    X(KENT_BRANCH_BLANK, "blank")                                                      \
    X(KENT_BRANCH_VALVE, "valve")                                                      \
    X(KENT_BRANCH_OPEN, "open")

#define ORIENTATIONS(X)                                                                \
    X(KENT_HORIZONTAL, "horizontal")                                                   \
    X(KENT_CREST, "crest")                                                             \
    X(KENT_SAG, "sag")                                                                 \
    X(KENT_COMBINED, "combined")

#define JOINTS(X)                                                                      \
    X(KENT_PUSH_ON, "push-on")                                                         \
    X(KENT_MECHANICAL, "mechanical")                                                   \
    X(KENT_FLANGED, "flanged")                                                         \
    X(KENT_WELDED, "welded")                                                           \
    X(KENT_FUSED, "fused")                                                             \
    X(KENT_RESTRAINED, "restrained")

#define CLASSES(X)                                                                     \
    X(KENT_RECURRING, "recurring")                                                     \
    X(KENT_OCCASIONAL, "occasional")                                                   \
    X(KENT_EXCEPTIONAL, "exceptional")

#define RESTRAINTS(X)                                                                  \
    X(KENT_THRUST_BLOCK, "thrust-block")                                               \
    X(KENT_ANCHOR_BLOCK, "anchor-block")                                               \
    X(KENT_RESTRAINED_JOINTS, "restrained-joints")                                     \
    X(KENT_BLOCK_AND_JOINTS, "block-and-joints")                                       \
    X(KENT_NO_RESTRAINT, "none")

#define NATURES(X)                                                                     \
    X(KENT_NATURAL, "natural")                                                         \
    X(KENT_FILL, "fill")                                                               \
    X(KENT_ORGANIC, "organic")                                                         \
    X(KENT_EXPANSIVE, "expansive")                                                     \
    X(KENT_LIQUEFIABLE, "liquefiable")                                                 \
    X(KENT_COLLAPSIBLE, "collapsible")

#define BACKINGS(X)                                                                    \
    X(KENT_BACKING_NATURAL, "natural")                                                 \
    X(KENT_BACKING_FILL, "compacted-fill")

#define BLOCK_POLICIES(X)                                                              \
    X(KENT_BLOCKS_ALLOWED, "allowed")                                                  \
    X(KENT_BLOCKS_FORBIDDEN, "forbidden")                                              \
    X(KENT_BLOCKS_ON_OLD_MAINS, "old-mains-only")                                      \
    X(KENT_BLOCKS_WITH_JOINTS, "with-joints")

#define SPREADS(X)                                                                     \
    X(KENT_SPREAD_45, "45-degrees")                                                    \
    X(KENT_SPREAD_CONCRETE, "plain-concrete")

#define CONCRETE_CODES(X)                                                              \
    X(KENT_EN_1992, "EN1992")                                                          \
    X(KENT_ACI_318, "ACI318")

#define LENGTH_FORMS(X)                                                                \
    X(KENT_FORM_HANDBOOK, "handbook")                                                  \
    X(KENT_FORM_ETL, "ETL-1110-3-446")

#define FRICTION_LAWS(X)                                                               \
    X(KENT_FRICTIONLESS, "frictionless")                                               \
    X(KENT_COLEBROOK_WHITE, "Colebrook-White")                                         \
    X(KENT_HAZEN_WILLIAMS, "Hazen-Williams")                                           \
    X(KENT_MANNING, "Manning")                                                         \
    X(KENT_DARCY_FIXED, "fixed Darcy factor")

#define AXIAL_SUPPORTS(X)                                                              \
    X(KENT_FLEXIBLE_JOINTS, "flexible-joints")                                         \
    X(KENT_FIXED_UPSTREAM, "fixed-upstream")                                           \
    X(KENT_FIXED_THROUGHOUT, "fixed-throughout")

#define DEVICES(X)                                                                     \
    X(KENT_DEVICE_PUMP, "pump")                                                        \
    X(KENT_DEVICE_CHECK_VALVE, "check valve")                                          \
    X(KENT_DEVICE_CONTROL_VALVE, "control valve")                                      \
    X(KENT_DEVICE_SURGE_TANK, "surge tank")                                            \
    X(KENT_DEVICE_ONE_WAY_TANK, "one-way surge tank")                                  \
    X(KENT_DEVICE_AIR_VESSEL, "air vessel")                                            \
    X(KENT_DEVICE_RELIEF_VALVE, "relief valve")                                        \
    X(KENT_DEVICE_AIR_VALVE, "air valve")                                              \
    X(KENT_DEVICE_BURST, "burst")                                                      \
    X(KENT_DEVICE_KINDS, "unknown")

#define AS_CASE(name, word)                                                            \
    case name:                                                                         \
        return word;
#define WORD_FUNCTION(function, enumeration, name, LIST)                               \
    const char *function(enumeration name)                                             \
    {                                                                                  \
        switch (name) {                                                                \
            LIST(AS_CASE)                                                              \
        }                                                                              \
        return "unknown";                                                              \
    }

WORD_FUNCTION(kent_fitting_type_word, kent_fitting_type, type, FITTING_TYPES)
WORD_FUNCTION(kent_role_word, kent_role, role, ROLES)
WORD_FUNCTION(kent_branch_end_word, kent_branch_end, end, BRANCH_ENDS)
WORD_FUNCTION(kent_orientation_word, kent_orientation, orientation, ORIENTATIONS)
WORD_FUNCTION(kent_joint_word, kent_joint, joint, JOINTS)
WORD_FUNCTION(kent_class_word, kent_class, class_of, CLASSES)
WORD_FUNCTION(kent_device_word, kent_device_kind, kind, DEVICES)
WORD_FUNCTION(kent_restraint_word, kent_restraint_choice, restraint, RESTRAINTS)
WORD_FUNCTION(kent_nature_word, kent_nature, nature, NATURES)
WORD_FUNCTION(kent_backing_word, kent_backing, backing, BACKINGS)
WORD_FUNCTION(kent_block_policy_word, kent_block_policy, policy, BLOCK_POLICIES)
WORD_FUNCTION(kent_spread_word, kent_spread, spread, SPREADS)
WORD_FUNCTION(kent_concrete_code_word, kent_concrete_code, code, CONCRETE_CODES)
WORD_FUNCTION(kent_length_form_word, kent_length_form, form, LENGTH_FORMS)
WORD_FUNCTION(kent_friction_word, kent_friction_law, law, FRICTION_LAWS)
WORD_FUNCTION(kent_axial_support_word, kent_axial_support, support, AXIAL_SUPPORTS)

const char *kent_trench_word(int trench)
{
    static const char *const WORDS[KENT_TRENCHES] = {"type-1", "type-2", "type-3",
                                                     "type-4", "type-5"};
    return trench >= 0 && trench < KENT_TRENCHES ? WORDS[trench] : "";
}

bool kent_role_on_run(kent_role role)
{
    return role == KENT_ROLE_WALL || role == KENT_ROLE_FLANGE_ADAPTOR;
}

bool kent_joint_slips(kent_joint joint)
{
    return joint == KENT_PUSH_ON || joint == KENT_MECHANICAL;
}

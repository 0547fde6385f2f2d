/* First steps with Bondmoment in C: a look-up, a charge from a dipole, the dipole of a molecule.

   cargo build --release --no-default-features --lib
   cc bindings/c/first.c -Iinclude target/release/libbondmoment.a -lpthread -ldl -lm -o first && ./first */
#include <bondmoment.h>
#include <math.h>
#include <stdio.h>

/* Says in words what a status means; the library names the argument and its limit. */
static int failed(const char *function, int32_t status)
{
    char text[200];
    if (status == BMOM_OK) return 0;
    if (bmom_status_message(function, -1, status, text, sizeof text, NULL) != BMOM_OK) text[0] = '\0';
    fprintf(stderr, "%s: %s\n", function, text);
    return 1;
}

int main(void)
{
    double radius, u_radius, charge, u_charge;

    if (bmom_abi_version() != BMOM_ABI_VERSION) return 1;

    /* Iron, high spin, in the table of Cordero et al. 2008. */
    if (failed("covalent_radius", bmom_covalent_radius(BMOM_RADII_CORDERO_2008, 26, BMOM_STATE_HIGH_SPIN,
                                                       &radius, &u_radius))) return 1;
    printf("Fe, high spin: %.2f +- %.2f A\n", radius, u_radius);

    /* Hydrogen chloride: 1.1086 +- 0.0003 D at 1.27455 A (exact here). */
    if (failed("charge_from_dipole", bmom_charge_from_dipole(1.1086, 0.0003, 1.27455, 0.0, &charge, &u_charge))) return 1;
    printf("HCl: %.5f +- %.5f e\n", charge, u_charge);

    /* Fluoromethane from elements and coordinates; bonds are found, charges by PEOE. */
    {
        const int32_t elements[5] = {6, 9, 1, 1, 1};
        const double xyz_A[15] = {0.0, 0.0, 0.0,   0.0, 0.0, 1.383,   1.0302, 0.0, -0.3637,
                                  -0.5151, 0.8922, -0.3637,   -0.5151, -0.8922, -0.3637};
        double dipole_D[3], magnitude_D, u_magnitude_D;
        if (failed("dipole", bmom_dipole(BMOM_CHARGES_PEOE_1980, BMOM_FRAME_AS_GIVEN, 5, elements, NULL, xyz_A,
                                         0, NULL, NULL, NULL, NULL, dipole_D, NULL, &magnitude_D, &u_magnitude_D,
                                         NULL, NULL, NULL))) return 1;
        printf("CH3F: (%.3f, %.3f, %.3f) D, from - to +; |mu| = %.3f D", dipole_D[0], dipole_D[1], dipole_D[2],
               magnitude_D);
        if (u_magnitude_D >= 0.0) printf(" +- %.3f D\n", u_magnitude_D);
        else printf(" (PEOE states no uncertainty)\n");
    }

    /* Bad input is a status in words, not a crash. */
    failed("charge_from_dipole", bmom_charge_from_dipole(1.1086, NAN, -1.0, NAN, &charge, NULL));
    return 0;
}

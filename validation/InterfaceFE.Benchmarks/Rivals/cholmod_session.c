/*
 * CHOLMOD on one matrix, driven by lines on standard input, so that its runs can alternate with another solver's. Answers are one line each.
 *   open FILE      int32 n, int32 nnz, int32 start[n+1], int32 row[nnz] (upper triangle by columns), double value[nnz], double right side[n]
 *   analyze        one line per configuration: its name, lnz, fl, milliseconds; analyses are kept
 *   round          factorises and solves once with each configuration: status, factor ms, solve ms of each
 *   solution FILE  writes the solution of the last sound configuration of the last round
 *   order FILE     lnz and fl of a given order: int32 permutation[n]
 *   versions       versions of the libraries
 * Times are processor time of this thread. Errors go to standard error and end the program.
 */
#define _GNU_SOURCE
#include <cholmod.h>
#include <dlfcn.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

enum { CONFIGURATIONS = 4 };

static const char *const names[CONFIGURATIONS] = { "supernodal-AMD", "supernodal-METIS", "simplicial-AMD", "simplicial-METIS" };
static const int orderings[CONFIGURATIONS] = { CHOLMOD_AMD, CHOLMOD_METIS, CHOLMOD_AMD, CHOLMOD_METIS };

static cholmod_common common;
static cholmod_sparse *matrix;
static cholmod_dense *right_side, *solution, *work_y, *work_e;
static cholmod_factor *factors[CONFIGURATIONS];

static double milliseconds(void)
{
    struct timespec t;
    clock_gettime(CLOCK_THREAD_CPUTIME_ID, &t);
    return t.tv_sec * 1e3 + t.tv_nsec * 1e-6;
}

static void fail(const char *what)
{
    fprintf(stderr, "%s\n", what);
    exit(1);
}

static void read_all(void *into, size_t size, size_t count, FILE *file)
{
    if (fread(into, size, count, file) != count)
        fail("a file ends too early");
}

static FILE *open_file(const char *name, const char *mode)
{
    FILE *file = fopen(name, mode);
    if (!file)
        fail("a file cannot be opened");
    return file;
}

static void open_matrix(const char *name)
{
    FILE *file = open_file(name, "rb");
    int n, nnz;
    read_all(&n, sizeof n, 1, file);
    read_all(&nnz, sizeof nnz, 1, file);
    matrix = cholmod_allocate_sparse(n, n, nnz, 1, 1, 1, CHOLMOD_REAL, &common);
    right_side = cholmod_allocate_dense(n, 1, n, CHOLMOD_REAL, &common);
    if (!matrix || !right_side)
        fail("not enough memory for the matrix");
    read_all(matrix->p, sizeof(int), n + 1, file);
    read_all(matrix->i, sizeof(int), nnz, file);
    read_all(matrix->x, sizeof(double), nnz, file);
    read_all(right_side->x, sizeof(double), n, file);
    fclose(file);
    printf("opened %d %d\n", n, nnz);
}

static void choose(int configuration)
{
    common.nmethods = 1;
    common.method[0].ordering = orderings[configuration];
    common.postorder = 1;
    common.supernodal = configuration < 2 ? CHOLMOD_SUPERNODAL : CHOLMOD_SIMPLICIAL;
}

static void analyze(void)
{
    for (int i = 0; i < CONFIGURATIONS; i++) {
        choose(i);
        double start = milliseconds();
        factors[i] = cholmod_analyze(matrix, &common);
        if (!factors[i])
            fail("the analysis failed");
        printf("analyzed %s %.17g %.17g %.17g\n", names[i], common.lnz, common.fl, milliseconds() - start);
    }
}

static void run_round(void)
{
    printf("round");
    for (int i = 0; i < CONFIGURATIONS; i++) {
        choose(i);
        double start = milliseconds();
        cholmod_factorize(matrix, factors[i], &common);
        double factored = milliseconds();
        int status = common.status;
        if (status == CHOLMOD_OK)
            cholmod_solve2(CHOLMOD_A, factors[i], right_side, NULL, &solution, NULL, &work_y, &work_e, &common);
        double solved = milliseconds();
        printf(" %d %.17g %.17g", status, factored - start, solved - factored);
    }
    printf("\n");
}

static void write_solution(const char *name)
{
    FILE *file = open_file(name, "wb");
    if (!solution || fwrite(solution->x, sizeof(double), matrix->nrow, file) != matrix->nrow)
        fail("the solution cannot be written");
    fclose(file);
    printf("written\n");
}

static void count_order(const char *name)
{
    int *permutation = malloc(matrix->nrow * sizeof(int));
    FILE *file = open_file(name, "rb");
    read_all(permutation, sizeof(int), matrix->nrow, file);
    fclose(file);
    choose(2);
    common.method[0].ordering = CHOLMOD_GIVEN;
    cholmod_factor *factor = cholmod_analyze_p(matrix, permutation, NULL, 0, &common);
    if (!factor)
        fail("the given order was refused");
    printf("ordered %.17g %.17g\n", common.lnz, common.fl);
    cholmod_free_factor(&factor, &common);
    free(permutation);
}

static void print_versions(void)
{
    const char *(*blas)(void) = (const char *(*)(void))dlsym(RTLD_DEFAULT, "openblas_get_config");
    printf("versions CHOLMOD %d.%d.%d (SuiteSparse %d.%d.%d), %s\n", CHOLMOD_MAIN_VERSION, CHOLMOD_SUB_VERSION, CHOLMOD_SUBSUB_VERSION,
        SUITESPARSE_MAIN_VERSION, SUITESPARSE_SUB_VERSION, SUITESPARSE_SUBSUB_VERSION, blas ? blas() : "BLAS other than OpenBLAS");
}

int main(void)
{
    static char line[4096];
    cholmod_start(&common);
    common.print = 0;
    while (fgets(line, sizeof line, stdin)) {
        line[strcspn(line, "\n")] = 0;
        char *argument = strchr(line, ' ');
        if (argument)
            *argument++ = 0;
        else
            argument = line + strlen(line);
        if (!strcmp(line, "versions"))
            print_versions();
        else if (!strcmp(line, "open"))
            open_matrix(argument);
        else if (!matrix)
            fail("no matrix is open");
        else if (!strcmp(line, "analyze"))
            analyze();
        else if (!strcmp(line, "round") && factors[0])
            run_round();
        else if (!strcmp(line, "solution"))
            write_solution(argument);
        else if (!strcmp(line, "order"))
            count_order(argument);
        else
            fail("unknown request");
        fflush(stdout);
    }
    return 0;
}

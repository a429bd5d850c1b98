/*
 * Solves one problem with SUNDIALS CVODE (BDF, Newton, dense LU, analytic Jacobian) as a peer for the trajectory
 * benchmark. The problem comes as problem.h: SIZE, END, start[], rates(y, f), slopes(y, columns).
 *
 *   cvode once RTOL ATOL           one solve: error code and the final state
 *   cvode time RTOL ATOL REPEATS   median microseconds of a solve over 7 batches
 */
#include <cvode/cvode.h>
#include <nvector/nvector_serial.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sunlinsol/sunlinsol_dense.h>
#include <sunmatrix/sunmatrix_dense.h>
#include <time.h>

#include "problem.h"

static int right_hand_side(realtype t, N_Vector y, N_Vector f, void *data) {
  (void)t;
  (void)data;
  rates(NV_DATA_S(y), NV_DATA_S(f));
  return 0;
}

static int jacobian(realtype t, N_Vector y, N_Vector f, SUNMatrix J, void *data, N_Vector a, N_Vector b, N_Vector c) {
  (void)t; (void)f; (void)data; (void)a; (void)b; (void)c;
  slopes(NV_DATA_S(y), SM_COLS_D(J));
  return 0;
}

static int solve(void *solver, N_Vector y, double rtol, double atol) {
  realtype reached;
  memcpy(NV_DATA_S(y), start, sizeof start);
  CVodeReInit(solver, 0, y);
  CVodeSStolerances(solver, rtol, atol);
  return CVode(solver, END, y, &reached, CV_NORMAL);
}

static double now(void) {
  struct timespec t;
  clock_gettime(CLOCK_MONOTONIC, &t);
  return 1e6 * t.tv_sec + 1e-3 * t.tv_nsec;
}

static int ascending(const void *a, const void *b) {
  double difference = *(const double *)a - *(const double *)b;
  return difference < 0 ? -1 : difference > 0;
}

int main(int count, char **words) {
  if (count < 4) return 2;
  double rtol = atof(words[2]), atol = atof(words[3]);
  SUNContext context;
  SUNContext_Create(NULL, &context);
  N_Vector y = N_VNew_Serial(SIZE, context);
  memcpy(NV_DATA_S(y), start, sizeof start);
  void *solver = CVodeCreate(CV_BDF, context);
  CVodeInit(solver, right_hand_side, 0, y);
  CVodeSStolerances(solver, rtol, atol);
  SUNMatrix matrix = SUNDenseMatrix(SIZE, SIZE, context);
  SUNLinearSolver linear = SUNLinSol_Dense(y, matrix, context);
  CVodeSetLinearSolver(solver, linear, matrix);
  CVodeSetJacFn(solver, jacobian);
  CVodeSetMaxNumSteps(solver, 5000000);
  CVodeSetErrFile(solver, NULL);
  int code = solve(solver, y, rtol, atol);
  if (strcmp(words[1], "once") == 0) {
    printf("%d", code);
    for (int i = 0; i < SIZE; i++) printf(" %.17g", NV_Ith_S(y, i));
    printf("\n");
    return 0;
  }
  int repeats = count > 4 ? atoi(words[4]) : 1;
  double batches[7];
  for (int b = 0; b < 7; b++) {
    double begin = now();
    for (int r = 0; r < repeats; r++) solve(solver, y, rtol, atol);
    batches[b] = (now() - begin) / repeats;
  }
  qsort(batches, 7, sizeof(double), ascending);
  printf("%.4f\n", batches[3]);
  return 0;
}

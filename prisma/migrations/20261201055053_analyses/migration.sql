-- CreateTable
CREATE TABLE "analysis" (
    "id" TEXT NOT NULL,
    "workspaceId" TEXT NOT NULL,
    "marketId" TEXT NOT NULL,
    "revisionId" TEXT NOT NULL,
    "fitId" TEXT NOT NULL,
    "kind" TEXT NOT NULL,
    "engineVersion" TEXT NOT NULL,
    "state" "FitState" NOT NULL DEFAULT 'queued',
    "progress" JSONB,
    "result" JSONB,
    "failureCode" TEXT,
    "attempts" INTEGER NOT NULL DEFAULT 0,
    "cancelAsked" BOOLEAN NOT NULL DEFAULT false,
    "createdAt" TIMESTAMP(3) NOT NULL DEFAULT CURRENT_TIMESTAMP,
    "startedAt" TIMESTAMP(3),
    "heartbeatAt" TIMESTAMP(3),
    "finishedAt" TIMESTAMP(3),

    CONSTRAINT "analysis_pkey" PRIMARY KEY ("id")
);

-- CreateIndex
CREATE INDEX "analysis_marketId_idx" ON "analysis"("marketId");

-- CreateIndex
CREATE INDEX "analysis_workspaceId_idx" ON "analysis"("workspaceId");

-- CreateIndex
CREATE INDEX "analysis_fitId_idx" ON "analysis"("fitId");

-- CreateIndex
CREATE UNIQUE INDEX "analysis_revisionId_kind_engineVersion_key" ON "analysis"("revisionId", "kind", "engineVersion");

-- AddForeignKey
ALTER TABLE "analysis" ADD CONSTRAINT "analysis_marketId_fkey" FOREIGN KEY ("marketId") REFERENCES "market"("id") ON DELETE CASCADE ON UPDATE CASCADE;

-- AddForeignKey
ALTER TABLE "analysis" ADD CONSTRAINT "analysis_revisionId_fkey" FOREIGN KEY ("revisionId") REFERENCES "series_revision"("id") ON DELETE CASCADE ON UPDATE CASCADE;

-- AddForeignKey
ALTER TABLE "analysis" ADD CONSTRAINT "analysis_fitId_fkey" FOREIGN KEY ("fitId") REFERENCES "fit"("id") ON DELETE CASCADE ON UPDATE CASCADE;

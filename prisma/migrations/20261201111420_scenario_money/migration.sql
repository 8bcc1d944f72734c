-- AlterTable
ALTER TABLE "scenario" ADD COLUMN     "fitId" TEXT,
ADD COLUMN     "money" JSONB;

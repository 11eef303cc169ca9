export { PageLoading as default } from '@/components/site/page-loading'
